export function Wordmark() {
  return (
    <span className="inline-flex items-baseline gap-2 text-lead font-semibold tracking-[.01em]">
      Evenfall
      <i
        aria-hidden="true"
        className="inline-block h-[9px] w-[22px] rounded-[2px] bg-[linear-gradient(90deg,var(--sky-0),var(--sky-6)_30%,var(--sky-12)_60%,var(--sky-night))] dark-site:outline dark-site:outline-rule-strong"
      />
    </span>
  );
}
