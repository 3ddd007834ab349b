import { figureParts } from '@/lib/contracts/format-figure';

interface FigureProps {
  readonly value: number | null | undefined;
  /** Standard error; its size decides the digits of both. */
  readonly error?: number | null | undefined;
  /** Decimals when there is no error. */
  readonly decimals?: number;
  readonly unit?: string;
}

/** A value beside its uncertainty, in Mono. */
export function Figure({ value, error, decimals = 3, unit }: FigureProps) {
  const parts = figureParts(value, error, decimals);
  return (
    <span className="font-mono whitespace-nowrap">
      {parts.value}
      {parts.error === null ? null : <span className="text-ink-2"> ± {parts.error}</span>}
      {unit === undefined ? null : <span className="font-sans"> {unit}</span>}
    </span>
  );
}
