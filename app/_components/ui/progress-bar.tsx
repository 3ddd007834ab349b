interface ProgressBarProps {
  /** 0 to 1; null while it cannot be known. */
  readonly value: number | null;
  /** What is being done. */
  readonly label: string;
  /** How much is left, in words. */
  readonly left?: string;
}

/** Long work: what is being done, how far it is, how much is left; by text first, by the bar second. */
export function ProgressBar({ value, label, left }: ProgressBarProps) {
  const percent = value === null ? null : Math.round(Math.min(1, Math.max(0, value)) * 100);
  return (
    <div>
      <div className="mb-1 flex flex-wrap justify-between gap-x-4 text-table">
        <span>{label}</span>
        <span className="font-mono">
          {percent === null ? 'under way' : `${percent} %`}
          {left === undefined ? '' : `, ${left}`}
        </span>
      </div>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent ?? undefined}
        aria-valuetext={percent === null ? 'under way' : `${percent} %`}
        className="h-2 overflow-hidden rounded-tag border border-edge bg-sheet"
      >
        <div
          className={percent === null ? 'h-full w-1/4 animate-pulse bg-accent' : 'h-full bg-accent'}
          style={percent === null ? undefined : { width: `${percent}%` }}
        />
      </div>
    </div>
  );
}
