#!/usr/bin/env bash
# From an observer's log to calibrated magnitudes over the HTTP interface, with curl and nothing else.
#
#   ./whole-night.sh FOLDER
#
# FOLDER holds frames.json (an array of up to 5,000 frames), standards.csv and targets.csv; calibrated.csv is written
# into it. Set beforehand:
#
#   EVENFALL_URL         address of the service, such as http://127.0.0.1:3000
#   TELESCOPE, NIGHT_DATE
#                        the telescope's code and the date of the local evening, such as 2026-10-15
#   OBSERVER, PHOTOMETRIST, APPROVER, INVESTIGATOR
#                        an API token each; tokens are made on the account page, or by POST /tokens
set -euo pipefail

folder=${1:?say which folder holds frames.json, standards.csv and targets.csv}
api=$EVENFALL_URL/api/v1

# call TOKEN METHOD PATH [CURL OPTIONS]: prints the answer; a refusal is printed too and ends the script.
call() {
  local token=$1 method=$2 path=$3 answer
  shift 3
  if ! answer=$(curl --silent --show-error --fail-with-body --request "$method" \
    --header "Authorization: Bearer $token" "$@" "$api$path"); then
    printf '%s %s was refused:\n%s\n' "$method" "$path" "$answer" >&2
    exit 1
  fi
  printf '%s' "$answer"
}

# value NAME: the first text of that name in the JSON that is read.
value() {
  grep -o "\"$1\":\"[^\"]*\"" | head -n 1 | cut -d '"' -f 4
}

json=(--header 'Content-Type: application/json')
csv=(--header 'Content-Type: text/csv')

# wait_for TOKEN JOB: until the job has ended; any end but `done` ends the script.
wait_for() {
  local job state
  while true; do
    job=$(call "$1" GET "/jobs/$2")
    state=$(value state <<<"$job")
    case $state in
      done) return ;;
      queued | running) sleep 0.5 ;;
      *)
        printf 'The job ended as %s:\n%s\n' "$state" "$job" >&2
        exit 1
        ;;
    esac
  done
}

# upload KIND: sends a table, waits until it is checked, and says what became of it.
upload() {
  local queued set
  queued=$(call "$OBSERVER" POST "/nights/$night/measurements?kind=$1&name=$1s" "${csv[@]}" \
    --data-binary "@$folder/$1s.csv")
  wait_for "$OBSERVER" "$(value job <<<"$queued")"
  set=$(call "$OBSERVER" GET "/measurement-sets/$(value set <<<"$queued")")
  case $(value state <<<"$set") in
    matched | 'in use') echo "$1s.csv is matched." ;;
    *)
      echo "$1s.csv was refused; its faults:" >&2
      call "$OBSERVER" GET "/measurement-sets/$(value set <<<"$queued")/faults?format=csv" >&2
      exit 1
      ;;
  esac
}

echo '1. The observer opens the night, logs its frames and uploads what was measured on them.'
night=$(call "$OBSERVER" POST /nights "${json[@]}" \
  --data "{\"telescope\":\"$TELESCOPE\",\"date\":\"$NIGHT_DATE\"}" | value id)
call "$OBSERVER" POST "/nights/$night/frames" "${json[@]}" --data-binary "@$folder/frames.json" >/dev/null
upload standard
upload target
call "$OBSERVER" PATCH "/nights/$night" "${json[@]}" --data '{"state":"closed"}' >/dev/null

echo '2. The photometrist solves it and proposes the solution.'
queued=$(call "$PHOTOMETRIST" POST "/nights/$night/solutions" "${json[@]}" --data '{}')
solution=$(value solution <<<"$queued")
wait_for "$PHOTOMETRIST" "$(value job <<<"$queued")"
found=$(call "$PHOTOMETRIST" GET "/solutions/$solution")
echo "The fit is $(value outcome <<<"$found") and suggests: $(value suggested_verdict <<<"$found")."
call "$PHOTOMETRIST" POST "/solutions/$solution/propose" "${json[@]}" \
  --data '{"comment":"Residuals without structure."}' >/dev/null

echo '3. Another photometrist approves it; the targets are transformed.'
call "$APPROVER" POST "/solutions/$solution/approve" "${json[@]}" --data '{"comment":"Agreed."}' >/dev/null
transformation=$(call "$APPROVER" GET '/jobs?kind=transform-targets&limit=1' | value id)
wait_for "$APPROVER" "$transformation"

echo '4. The investigator takes the calibrated magnitudes.'
call "$INVESTIGATOR" GET "/nights/$night/calibrated?format=csv" --output "$folder/calibrated.csv"
echo "$(grep -vc '^#' "$folder/calibrated.csv") lines in $folder/calibrated.csv."
