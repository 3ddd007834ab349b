#!/usr/bin/env bash
# Sets up, starts, tests and looks after Evenfall on one Debian machine. `./docker-free-start.sh --help` tells more.
# What it says on the way goes to standard error; standard output carries the one line that a start ends with.
set -euo pipefail
shopt -s inherit_errexit

cd "$(dirname "$(readlink -f "${BASH_SOURCE[0]}")")"
readonly HOME_DIR=$PWD
export PATH="$PATH:/usr/local/sbin:/usr/sbin:/sbin"

usage() {
  cat <<'HELP'
Evenfall: night log and photometric calibration.

  ./docker-free-start.sh                start with the demo observatory, on http://127.0.0.1:3000
  ./docker-free-start.sh --no-demo      start for real use: no demo data, no demo accounts
  ./docker-free-start.sh test           set up, check and test everything on a throw-away database
  ./docker-free-start.sh first-manager EMAIL NAME
                                        make the first manager account; prints a one-time link
  ./docker-free-start.sh backup FILE    write database and uploaded files into one tar archive
  ./docker-free-start.sh restore FILE   put them back into DATA_DIR, replacing what is there
  ./docker-free-start.sh --help         this text

The only thing expected is Node.js 20.9 or newer. MariaDB comes from Debian's packages (and Chromium, for the tests);
installing them needs root, once. Settings are environment variables, or lines of a file .env here; .env.example
explains each. The ones for a second copy beside the first: PORT, DB_PORT, DATA_DIR.
HELP
}

# ---- Speaking -------------------------------------------------------------------------------------------------------

# Speaks on the script's own standard error also while a step's output goes to a log.
exec 6>&2
say() { printf '%s\n' "· $*" >&6; }

# The first argument is what is wrong, the others are what to do about it.
die() {
  printf '\nEvenfall cannot go on: %s\n' "$1" >&6
  shift
  local line
  for line in "$@"; do printf '  %s\n' "$line" >&6; done
  exit 1
}

# Shows the end of a log, and names a full disk when that is what it complains about.
die_with_log() {
  local what=$1 log=$2
  printf '\nEvenfall cannot go on: %s\n' "$what" >&6
  if [[ -s $log ]]; then
    if grep -qiE 'no space left|ENOSPC|errno: 28|disk (is )?full' "$log"; then
      printf '  The disk is full: make room on the one that holds %s and on the one that holds %s.\n' \
        "$DATA_DIR" "$HOME_DIR" >&6
    fi
    printf '  Its errors, and the last lines of %s:\n' "$log" >&6
    { grep -E '\bERROR\b' "$log" | tail -n 5 || true; tail -n 15 "$log"; } | awk '!seen[$0]++ { print "    " $0 }' >&6
  fi
  exit 1
}

is_root() { [[ $(id -u) -eq 0 ]]; }
have() { command -v "$1" >/dev/null 2>&1; }

# ---- Settings -------------------------------------------------------------------------------------------------------

# Reads NAME=VALUE lines of .env; what the environment already says wins. Nothing in the file is executed.
read_env_file() {
  [[ -f .env ]] || return 0
  local line name value
  while IFS= read -r line || [[ -n $line ]]; do
    [[ $line =~ ^[[:space:]]*([A-Z][A-Z0-9_]*)=(.*)$ ]] || continue
    name=${BASH_REMATCH[1]}
    value=${BASH_REMATCH[2]%$'\r'}
    if [[ $value =~ ^\"(.*)\"$ || $value =~ ^\'(.*)\'$ ]]; then value=${BASH_REMATCH[1]}; fi
    if [[ ! -v $name ]]; then export "$name=$value"; fi
  done <.env
}

need_port() {
  local name=$1 value=${!1}
  if ! [[ $value =~ ^[1-9][0-9]{0,4}$ ]] || ((value > 65535)); then
    die "$name is $value, which is not a port number." "Set $name to a number from 1 to 65535."
  fi
}

is_loopback() { [[ $1 == localhost || $1 == ::1 || $1 =~ ^127\.[0-9]+\.[0-9]+\.[0-9]+$ ]]; }

settings() {
  read_env_file
  export PORT=${PORT:-3000} BIND=${BIND:-127.0.0.1} DB_PORT=${DB_PORT:-3307}
  need_port PORT
  need_port DB_PORT
  export MAIL_CATCHER_PORT=${MAIL_CATCHER_PORT:-$((PORT + 525 <= 65535 ? PORT + 525 : PORT - 525))}
  need_port MAIL_CATCHER_PORT
  export DB_HOST=127.0.0.1 DB_NAME=evenfall DB_USER=evenfall
  export BASE_URL=${BASE_URL:-http://127.0.0.1:$PORT}
  export EVENFALL_DEMO=${EVENFALL_DEMO:-1}
  DATA_DIR=$(realpath -m -- "${DATA_DIR:-.data}")
  export DATA_DIR
  LOGS=$DATA_DIR/log
  if [[ -z ${SECURE_COOKIES:-} ]]; then
    if [[ $BASE_URL == https:* ]]; then SECURE_COOKIES=1; else SECURE_COOKIES=0; fi
  fi
  export SECURE_COOKIES
  if [[ $EVENFALL_DEMO == 1 ]]; then
    # The demo's mail goes to the local catcher and nowhere else, whatever .env says.
    export DEMO_PASSWORD=${DEMO_PASSWORD:-evenfall-demo} SMTP_URL=smtp://127.0.0.1:$MAIL_CATCHER_PORT
  else
    unset DEMO_PASSWORD MAIL_CATCHER_PORT
  fi
}

check_settings() {
  [[ $EVENFALL_DEMO == [01] ]] || die "EVENFALL_DEMO is $EVENFALL_DEMO; it can be 1 or 0."
  if [[ $EVENFALL_DEMO == 1 ]] && ! is_loopback "$BIND"; then
    die "the demo's passwords are known to everybody, so it listens on this machine only, not on BIND=$BIND." \
      "Leave BIND at 127.0.0.1, or start with --no-demo."
  fi
  if [[ $PORT == "$DB_PORT" || $PORT == "${MAIL_CATCHER_PORT:-}" || $DB_PORT == "${MAIL_CATCHER_PORT:-}" ]]; then
    die "PORT, DB_PORT and MAIL_CATCHER_PORT must differ; they are $PORT, $DB_PORT and ${MAIL_CATCHER_PORT:-unset}."
  fi
}

# ---- What the machine must have -------------------------------------------------------------------------------------

need_node() {
  have node || die "Node.js is not installed." "Install Node.js 20.9 or newer, with npm, then start again."
  local version
  version=$(node --version)
  if ! [[ $version =~ ^v([0-9]+)\.([0-9]+) ]] || ((BASH_REMATCH[1] * 1000 + BASH_REMATCH[2] < 20009)); then
    die "Node.js is $version, and Evenfall needs 20.9 or newer." "Install a newer Node.js, then start again."
  fi
  have npm || die "npm is not installed." "Install npm, which belongs to Node.js, then start again."
}

# need_packages WHAT COMMANDS -- PACKAGES: installs Debian packages when one of the commands is missing.
need_packages() {
  local what=$1 missing=0
  shift
  while [[ $1 != -- ]]; do
    have "$1" || missing=1
    shift
  done
  shift
  ((missing)) || return 0
  if ! is_root; then
    die "$what is not installed, and only an administrator can install it." \
      "Ask for this line to be run as root, then start again:" "  apt-get install --no-install-recommends $*"
  fi
  have apt-get || die "$what is not installed, and this is not a Debian system." "Install: $*"
  say "Installing $what from Debian's packages ($*)"
  local log
  log=$(mktemp)
  if ! { apt-get update && apt-get install -y --no-install-recommends "$@"; } >"$log" 2>&1 </dev/null; then
    die_with_log "Debian's packages for $what could not be installed ($*)." "$log"
  fi
  rm -f "$log"
}

# The packages without the system's own service: nothing but our private server is ever started.
need_mariadb() {
  need_packages MariaDB mariadbd mariadb-install-db mariadb mariadb-admin mariadb-dump \
    -- mariadb-server-core mariadb-client
  if is_root && ! id mysql >/dev/null 2>&1; then
    useradd --system --user-group --no-create-home --home-dir /nonexistent --shell /usr/sbin/nologin mysql
  fi
}

# need_room FOLDER MEGABYTES WHAT-FOR
need_room() {
  local free_mb
  free_mb=$(($(df -Pk -- "$1" | awk 'NR == 2 { print $4 }') / 1024))
  ((free_mb >= $2)) || die "the disk is full: $1 has $free_mb MB left, and $3 needs $2 MB." \
    "Make room there, or set DATA_DIR to a folder on another disk."
}

# ---- Running things -------------------------------------------------------------------------------------------------

STEP=''
# Runs a program to its end in a process group of its own; a signal to this script does not wait for it.
step() {
  setsid -- "$@" 6>&- 7>&- 8>&- 9>&- </dev/null &
  STEP=$!
  local code=0
  wait "$STEP" || code=$?
  STEP=''
  return "$code"
}

# script FILE ARGS: one of the project's own TypeScript programs.
script() { step node --conditions=react-server --import tsx "$@"; }

# quiet_step WHAT COMMAND…: says what it does, keeps its output in a log, shows the log's end when it fails.
quiet_step() {
  local what=$1 log=$LOGS/set-up.log
  shift
  say "$what"
  "$@" >"$log" 2>&1 || die_with_log "this step failed: $what." "$log"
}

running_pid() {
  local file=$DATA_DIR/run/$1.pid pid
  [[ -s $file ]] && pid=$(<"$file") && [[ $pid =~ ^[0-9]+$ ]] || return 1
  # A number may have passed to another program since: ours carries our DATA_DIR in its environment.
  tr '\0' '\n' 2>/dev/null <"/proc/$pid/environ" | grep -qxF "DATA_DIR=$DATA_DIR" || return 1
  printf '%s' "$pid"
}

# start_program NAME COMMAND…: in the background, in its own session, so that Ctrl-C reaches this script alone.
start_program() {
  local name=$1 log=$LOGS/$1.log
  shift
  if [[ -f $log && $(stat -c %s "$log") -gt 20000000 ]]; then mv -f "$log" "$log.1"; fi
  setsid -- "$@" >>"$log" 2>&1 6>&- 7>&- 8>&- 9>&- </dev/null &
  printf '%s\n' $! >"$DATA_DIR/run/$name.pid"
  PIDS[$name]=$!
}

# Runs, and is not merely waiting for its end to be noted.
alive() {
  local stat
  read -r stat 2>/dev/null <"/proc/$1/stat" || return 1
  [[ ${stat##*) } != Z* ]]
}

# stop_pid PID SECONDS: asks, waits, and insists when the time is over.
stop_pid() {
  local pid=$1 tenths=$(($2 * 10))
  kill -TERM "$pid" 2>/dev/null || return 0
  while alive "$pid" && ((tenths-- > 0)); do sleep 0.1; done
  if alive "$pid"; then
    say "Process $pid did not stop in $2 s and is ended by force"
    kill -KILL "$pid" 2>/dev/null || true
  fi
}

declare -A PIDS=()
readonly ORDER_OF_STOP=(app mail-catcher mariadb)
readonly -A PATIENCE=([app]=30 ['mail-catcher']=5 [mariadb]=120)

stop_program() {
  local name=$1
  [[ -n ${PIDS[$name]:-} ]] || return 0
  stop_pid "${PIDS[$name]}" "${PATIENCE[$name]}"
  say "Stopped: $name"
  unset "PIDS[$name]"
  rm -f "$DATA_DIR/run/$name.pid"
}

# Stops what this run started, the application first, the database last. Runs once, at every end of the script.
stop_all() {
  trap '' INT TERM HUP
  if [[ -n $STEP ]]; then
    kill -TERM -- "-$STEP" 2>/dev/null || true
    stop_pid "$STEP" 10
    kill -KILL -- "-$STEP" 2>/dev/null || true
  fi
  local name
  for name in "${ORDER_OF_STOP[@]}"; do stop_program "$name"; done
  if [[ -n ${SOCKET_DIR:-} ]]; then
    rm -rf "$SOCKET_DIR"
    rm -f "$DATA_DIR/run/socket"
  fi
}

stop_asked() {
  say 'Asked to stop'
  exit 0
}

traps() {
  trap stop_all EXIT
  trap stop_asked INT TERM HUP
}

# ---- The data folder ------------------------------------------------------------------------------------------------

# Makes DATA_DIR and takes it for this run alone.
take_data_folder() {
  if ! mkdir -p -- "$DATA_DIR" 2>/dev/null || [[ ! -w $DATA_DIR ]]; then
    die "the folder DATA_DIR=$DATA_DIR cannot be made or written." "Set DATA_DIR to a folder of your own."
  fi
  # Passable, not readable, for the database's account; closed to all others when that is the same account.
  if is_root; then chmod 711 "$DATA_DIR"; else chmod 700 "$DATA_DIR"; fi
  if is_root && ! runuser -u mysql -- test -x "$DATA_DIR"; then
    die "MariaDB's account, mysql, cannot enter DATA_DIR=$DATA_DIR: a folder above it is closed to others." \
      "Set DATA_DIR to a folder that others may pass through (for example under /srv or /var/lib)."
  fi
  exec 9>"$DATA_DIR/lock"
  flock -n 9 || die "Evenfall already runs on DATA_DIR=$DATA_DIR." \
    "Stop it there with Ctrl-C, or set DATA_DIR, PORT and DB_PORT for a second copy."
  need_room "$DATA_DIR" 512 "a start"
  mkdir -p "$LOGS" "$DATA_DIR/run"
  chmod 700 "$LOGS" "$DATA_DIR/run"
  local name pid
  for name in "${ORDER_OF_STOP[@]}"; do
    if pid=$(running_pid "$name"); then
      say "An earlier run was ended by force; stopping its $name (process $pid)"
      stop_pid "$pid" "${PATIENCE[$name]}"
    fi
    rm -f "$DATA_DIR/run/$name.pid"
  done
  if [[ -s $DATA_DIR/run/socket ]]; then
    local socket
    socket=$(<"$DATA_DIR/run/socket")
    [[ $socket != /tmp/evenfall-* ]] || rm -rf "$(dirname "$socket")"
    rm -f "$DATA_DIR/run/socket"
  fi
}

# Demo accounts have known passwords: they never get into a real observatory's data, and the other way round.
check_mode() {
  local mode=real kept
  [[ $EVENFALL_DEMO != 1 ]] || mode=demo
  kept=$(cat "$DATA_DIR/mode" 2>/dev/null || printf '%s' "$mode")
  if [[ $kept == demo && $mode == real ]]; then
    die "DATA_DIR=$DATA_DIR holds the demo, whose accounts have a known password." \
      "Set DATA_DIR to another folder for real use."
  elif [[ $kept == real && $mode == demo ]]; then
    die "DATA_DIR=$DATA_DIR holds a real observatory's data, where the demo does not belong." \
      "Start with --no-demo, or set DATA_DIR to another folder for the demo."
  fi
  printf '%s\n' "$mode" >"$DATA_DIR/mode"
}

# need_free_port NAME ADDRESS
need_free_port() {
  local name=$1 address=$2 port=${!1}
  [[ $address != 0.0.0.0 && $address != :: ]] || address=127.0.0.1
  if (exec 3<>"/dev/tcp/$address/$port") 2>/dev/null; then
    die "port $port is taken by another program ($name)." "Stop that program, or set $name to a free port."
  fi
}

# ---- MariaDB --------------------------------------------------------------------------------------------------------

database_password() {
  if [[ ! -s $DATA_DIR/db-password ]]; then
    (umask 077 && node -p 'crypto.randomBytes(24).toString("base64url")' >"$DATA_DIR/db-password")
  fi
  DB_PASSWORD=$(<"$DATA_DIR/db-password")
  export DB_PASSWORD
}

as_mysql() { if is_root; then printf '%s' --user=mysql; else printf '%s' --user="$(id -un)"; fi; }

# MariaDB clears its folder for temporary tables when it starts, so no two servers may share one.
make_database_tmp() {
  rm -rf "$DATA_DIR/db-tmp"
  mkdir -m 700 "$DATA_DIR/db-tmp"
  ! is_root || chown mysql: "$DATA_DIR/db-tmp"
}

# The data files appear under their final name only when they are complete.
install_database() {
  [[ ! -d $DATA_DIR/db/mysql ]] || return 0
  local log=$LOGS/mariadb-install.log
  say 'Making the database'
  rm -rf "$DATA_DIR/db.new"
  mkdir -p "$DATA_DIR/db.new"
  ! is_root || chown mysql: "$DATA_DIR/db.new"
  step mariadb-install-db --no-defaults "$(as_mysql)" --datadir="$DATA_DIR/db.new" --tmpdir="$DATA_DIR/db-tmp" \
    --skip-test-db >"$log" 2>&1 || die_with_log "MariaDB's data folder could not be made." "$log"
  rm -rf "$DATA_DIR/db"
  mv "$DATA_DIR/db.new" "$DATA_DIR/db"
}

administer() { mariadb --no-defaults --socket="$SOCKET" --user="$(id -un)" --batch --skip-column-names "$@"; }

start_database() {
  need_free_port DB_PORT 127.0.0.1
  make_database_tmp
  install_database
  database_password
  # A socket's path may be 107 bytes long, so it does not lie in DATA_DIR.
  SOCKET_DIR=$(mktemp -d /tmp/evenfall-XXXXXX)
  SOCKET=$SOCKET_DIR/db
  printf '%s\n' "$SOCKET" >"$DATA_DIR/run/socket"
  ! is_root || chown mysql: "$SOCKET_DIR"
  say "Starting MariaDB on 127.0.0.1:$DB_PORT"
  start_program mariadb mariadbd --no-defaults "$(as_mysql)" --datadir="$DATA_DIR/db" --socket="$SOCKET" \
    --port="$DB_PORT" --bind-address=127.0.0.1 --pid-file="$SOCKET_DIR/pid" --tmpdir="$DATA_DIR/db-tmp" \
    --default-time-zone=+00:00 --character-set-server=utf8mb4 --collation-server=utf8mb4_unicode_ci \
    --innodb-buffer-pool-size="${DB_MEMORY_MB:-512}M" --max-connections=200
  local tenths=900
  until mariadb-admin --no-defaults --socket="$SOCKET" --user="$(id -un)" ping >/dev/null 2>&1; do
    if ! alive "${PIDS[mariadb]}" || ((tenths-- <= 0)); then
      die_with_log "MariaDB did not start." "$LOGS/mariadb.log"
    fi
    sleep 0.1
  done
  administer <<SQL || die_with_log "MariaDB refused to make the database and its account." "$LOGS/mariadb.log"
CREATE DATABASE IF NOT EXISTS $DB_NAME;
CREATE USER IF NOT EXISTS '$DB_USER'@'127.0.0.1', '$DB_USER'@'localhost';
ALTER USER '$DB_USER'@'127.0.0.1' IDENTIFIED BY '$DB_PASSWORD', '$DB_USER'@'localhost' IDENTIFIED BY '$DB_PASSWORD';
GRANT ALL ON $DB_NAME.* TO '$DB_USER'@'127.0.0.1', '$DB_USER'@'localhost';
SQL
}

# Finds the database of this DATA_DIR, running or not, for a command that is not a start.
reach_database() {
  if [[ -s $DATA_DIR/run/socket ]] && running_pid mariadb >/dev/null; then
    SOCKET=$(<"$DATA_DIR/run/socket")
    database_password
  else
    take_data_folder
    start_database
  fi
}

# ---- Packages and build ---------------------------------------------------------------------------------------------

# Copies of one folder share node_modules and .next. Descriptor 8 is held by who changes them, 7 by who runs from them.
lock_checkout() {
  exec 8<"$HOME_DIR" 7<"$HOME_DIR/app"
  flock -n 8 || {
    say 'Waiting for another copy that is installing or building in this folder'
    flock 8
  }
}

need_sole_use() {
  flock -n 7 || die "another copy runs from this folder, and $1." "Stop it, then start again."
}

install_modules() {
  local stamp=node_modules/.evenfall-installed wanted
  wanted="$(node --version) $(sha256sum <package-lock.json)"
  [[ ! -f $stamp || $(<"$stamp") != "$wanted" ]] || return 0
  need_sole_use 'the packages changed since it started'
  need_room "$HOME_DIR" 1500 'installing the packages'
  quiet_step 'Installing packages with npm (about a minute)' step npm ci --include=dev --no-audit --no-fund
  printf '%s\n' "$wanted" >"$stamp"
}

# One hash over every file that the build reads, and the version of Node.js that runs it.
hash_of_sources() {
  node --version
  {
    find app lib db workers fixtures public -type f -print0 2>/dev/null
    find . -maxdepth 1 -type f \( -name '*.ts' -o -name '*.mjs' -o -name '*.json' \) -not -name next-env.d.ts -print0
  } | sort -z | xargs -0 -r sha256sum -- | sha256sum
}

build_application() {
  local stamp=.next/evenfall-sources wanted
  wanted=$(hash_of_sources)
  [[ ! -f $stamp || ! -f .next/BUILD_ID || $(<"$stamp") != "$wanted" ]] || return 0
  need_sole_use 'its sources changed since it was built'
  need_room "$HOME_DIR" 800 'building'
  rm -f "$stamp"
  quiet_step 'Building (about a minute)' step env NODE_ENV=production NEXT_TELEMETRY_DISABLED=1 \
    node node_modules/next/dist/bin/next build
  printf '%s\n' "$wanted" >"$stamp"
}

prepare_checkout() {
  lock_checkout
  install_modules
  [[ $1 == packages ]] || build_application
  flock -s 7
  flock -u 8
}

# ---- Commands -------------------------------------------------------------------------------------------------------

load_data() {
  quiet_step 'Applying migrations' script db/migrate.ts
  quiet_step 'Loading reference data' script db/seeders/main.ts reference
  [[ $EVENFALL_DEMO != 1 ]] || quiet_step 'Loading the demo observatory' script db/seeders/main.ts demo
}

is_healthy() {
  node -e 'fetch(process.argv[1], { signal: AbortSignal.timeout(3000) }).then((r) => r.json())
    .then((h) => process.exit(h.status === "ok" ? 0 : 1), () => process.exit(1))' "$1/api/v1/health"
}

start_application() {
  local address=$BIND
  [[ $address != 0.0.0.0 ]] || address=127.0.0.1
  [[ $address != *:* ]] || address="[$address]"
  if [[ $EVENFALL_DEMO == 1 ]]; then
    start_program mail-catcher node --conditions=react-server --import tsx workers/mail-catcher.ts
  fi
  say 'Starting the application'
  # Evenfall closes its own queue and streams when it is asked to stop; Next would not wait for them.
  start_program app env NODE_ENV=production NEXT_MANUAL_SIG_HANDLE=1 NEXT_TELEMETRY_DISABLED=1 \
    node node_modules/next/dist/bin/next start -H "$BIND" -p "$PORT"
  local tenths=900
  until is_healthy "http://$address:$PORT"; do
    if ! alive "${PIDS[app]}" || ((tenths-- <= 0)); then
      die_with_log 'the application did not start.' "$LOGS/app.log"
    fi
    sleep 0.1
  done
}

ready_line() {
  local line="Evenfall is ready at $BASE_URL"
  if [[ $EVENFALL_DEMO == 1 ]]; then
    line+=" | demo accounts: manager@evenfall.example, photometrist@, photometrist2@, observer@, pi@, coinvestigator@"
    line+=" | password: $DEMO_PASSWORD"
  elif [[ $(administer "$DB_NAME" -e "SELECT COUNT(*) FROM person_roles WHERE role = 'manager'") == 0 ]]; then
    line+=" | no manager yet: run ./docker-free-start.sh first-manager EMAIL NAME beside it"
  fi
  printf '%s | Ctrl-C stops it\n' "$line"
}

# Waits until one of the programs ends by itself, which none should.
watch() {
  wait -n "${PIDS[@]}" || true
  local name
  for name in "${ORDER_OF_STOP[@]}"; do
    if [[ -n ${PIDS[$name]:-} ]] && ! alive "${PIDS[$name]}"; then
      die_with_log "$name ended by itself." "$LOGS/$name.log"
    fi
  done
}

command_start() {
  settings
  check_settings
  need_node
  need_mariadb
  traps
  take_data_folder
  check_mode
  need_free_port PORT "$BIND"
  [[ $EVENFALL_DEMO != 1 ]] || need_free_port MAIL_CATCHER_PORT 127.0.0.1
  need_free_port DB_PORT 127.0.0.1
  prepare_checkout build
  start_database
  load_data
  start_application
  [[ $EVENFALL_DEMO != 1 ]] || quiet_step 'Calibrating nights of the demo' script db/seeders/main.ts demo-decisions
  ready_line
  while :; do watch; done
}

command_first_manager() {
  [[ $# -ge 2 ]] || die 'first-manager needs an e-mail address and a name.' \
    "For example: ./docker-free-start.sh first-manager ada@observatory.example 'Ada Marsh'"
  EVENFALL_DEMO=0
  settings
  need_node
  need_mariadb
  traps
  prepare_checkout packages
  reach_database
  check_mode
  script db/migrate.ts >&2
  script workers/first-manager.ts "$@"
}

# ---- Backup ---------------------------------------------------------------------------------------------------------

# What of DATA_DIR a backup holds beside the database: not the database's own files, nor what belongs to one run.
kept_entries() {
  local unwanted='db|db\.new|db-tmp|db-password|lock|log|run|work|backup-.*'
  find "$DATA_DIR" -mindepth 1 -maxdepth 1 -printf '%f\0' | grep -zvxE "$unwanted" || true
}

command_backup() {
  [[ $# -eq 1 ]] || die 'backup needs the name of the archive to write.'
  settings
  need_mariadb
  need_node
  [[ -d $DATA_DIR/db ]] || die "there is nothing to back up in DATA_DIR=$DATA_DIR."
  local target work
  target=$(realpath -m -- "$1")
  traps
  reach_database
  work=$(mktemp -d "$DATA_DIR/backup-XXXXXX")
  # The dump comes first: a file that its rows name is on disk by then, and uploaded files never change.
  say 'Writing the database'
  step mariadb-dump --no-defaults --socket="$SOCKET" --user="$(id -un)" --single-transaction --hex-blob \
    --no-tablespaces --result-file="$work/database.sql" "$DB_NAME" || {
    rm -rf "$work"
    die 'the database could not be written to the disk.'
  }
  say 'Packing the archive'
  kept_entries >"$work/entries"
  (umask 077 && : >"$target.part") || die "the archive $target cannot be written."
  local code=0
  step tar -cf "$target.part" --exclude=originals/incoming -C "$work" database.sql \
    -C "$DATA_DIR" --null -T "$work/entries" || code=$?
  # 1 only tells that files came or went meanwhile, which an upload does.
  if ((code > 1)); then
    rm -rf "$work" "$target.part"
    die "the archive $target could not be written."
  fi
  rm -rf "$work"
  mv "$target.part" "$target"
  printf 'Backup written: %s\n' "$target"
}

command_restore() {
  [[ $# -eq 1 && -f $1 ]] || die 'restore needs the name of an archive that backup wrote.'
  settings
  need_mariadb
  need_node
  tar -tf "$1" database.sql >/dev/null 2>&1 || die "$1 is not an archive that backup wrote."
  local archive
  archive=$(realpath -- "$1")
  traps
  take_data_folder
  start_database
  local work
  work=$(mktemp -d "$DATA_DIR/backup-XXXXXX")
  step tar -xf "$archive" -C "$work" || die_with_log "the archive could not be unpacked." /dev/null
  say 'Loading the database'
  administer -e "DROP DATABASE $DB_NAME; CREATE DATABASE $DB_NAME"
  administer "$DB_NAME" <"$work/database.sql" || die 'the database could not be loaded from the archive.'
  rm "$work/database.sql"
  local entry
  for entry in "$work"/*; do
    [[ -e $entry ]] || continue
    rm -rf "${DATA_DIR:?}/$(basename "$entry")"
    mv "$entry" "$DATA_DIR/"
  done
  rm -rf "$work"
  printf 'Restored from %s into %s\n' "$archive" "$DATA_DIR"
}

# ---- Tests ----------------------------------------------------------------------------------------------------------

PASSED=0
FAILED=0
# gate NAME COMMAND…: one check, which counts as one test.
gate() {
  local name=$1
  shift
  say "Check: $name"
  if step "$@" >&2; then
    PASSED=$((PASSED + 1))
  else
    FAILED=$((FAILED + 1))
    say "Check failed: $name"
  fi
}

quality_gates() {
  gate 'shell script' shellcheck docker-free-start.sh .ci/run
  gate 'format' npx prettier --check .
  gate 'types of routes' npx next typegen
  gate 'types' npx tsc --noEmit
  gate 'rules' npx eslint . --max-warnings 0
  gate 'dependencies' npx depcruise app lib db workers --config .dependency-cruiser.mjs
  gate 'nothing unused' npx knip
}

run_tests() {
  local report=tests/.output/vitest.json code=0 passed failed
  mkdir -p tests/.output
  rm -f "$report"
  step npx vitest run --reporter=default --reporter=json --outputFile.json="$report" >&2 || code=$?
  [[ -s $report ]] || printf '{"numPassedTests":0,"numFailedTests":0}' >"$report"
  passed=$(node -p 'JSON.parse(fs.readFileSync(process.argv[1], "utf8")).numPassedTests' "$report")
  failed=$(node -p 'JSON.parse(fs.readFileSync(process.argv[1], "utf8")).numFailedTests' "$report")
  # A file that could not even be loaded has no failed test in it, but the run has failed.
  if ((code != 0 && failed == 0)); then failed=1; fi
  PASSED=$((PASSED + passed))
  FAILED=$((FAILED + failed))
}

command_test() {
  DATA_DIR=$(mktemp -d /tmp/evenfall-test-XXXXXX)
  LOGS=$DATA_DIR
  trap 'stop_all; rm -rf "$DATA_DIR"' EXIT
  trap 'exit 130' INT TERM HUP
  # The tests choose their own settings; what the environment says about a real installation stays outside.
  unset PORT BIND BASE_URL DB_HOST DB_PORT DB_USER DB_PASSWORD DB_NAME DB_CONNECTIONS EVENFALL_DEMO DEMO_PASSWORD \
    SECURE_COOKIES SMTP_URL MAIL_FROM MAIL_CATCHER_PORT WORKER_CONCURRENCY WORKER_IN_SERVER NODE_ENV
  need_node
  need_mariadb
  need_packages Chromium chromium -- chromium fonts-dejavu-core
  need_packages shellcheck shellcheck -- shellcheck
  export NEXT_TELEMETRY_DISABLED=1
  prepare_checkout build
  quality_gates
  run_tests
  printf '%d passed, %d failed\n' "$PASSED" "$FAILED"
  ((FAILED == 0))
}

main() {
  case ${1:-} in
    '') command_start ;;
    --no-demo)
      export EVENFALL_DEMO=0
      command_start
      ;;
    test) command_test ;;
    first-manager | backup | restore)
      local name=${1//-/_}
      shift
      "command_$name" "$@"
      ;;
    -h | --help | help) usage ;;
    *)
      usage >&2
      die "$1 is not one of its commands."
      ;;
  esac
}

main "$@"
