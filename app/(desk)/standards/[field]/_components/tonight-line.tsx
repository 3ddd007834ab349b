import { formatFixed } from '@/lib/contracts/format-figure';
import { formatDateInWords, formatMinutes } from '@/app/_components/ui/format-time';

interface TonightLineProps {
  readonly tonight: {
    readonly airmass: number;
    readonly utc: number;
    readonly from: number;
    readonly to: number;
    readonly moonSeparation: number;
  } | null;
  readonly telescope: { readonly name: string; readonly minAltitude: number } | null;
  readonly night: { readonly date: string } | null;
}

/** What the field is good for tonight, in one sentence. */
export function TonightLine({ tonight, telescope, night }: TonightLineProps) {
  if (telescope === null || night === null) return null;
  const where = `${telescope.name}, night of ${formatDateInWords(night.date)}`;
  return (
    <p className="mb-4 max-w-prose">
      {tonight === null ? (
        <>
          {where}: it does not rise above {formatFixed(telescope.minAltitude, 0)}° while it is dark.
        </>
      ) : (
        <>
          {where}: best at airmass <span className="font-mono">{formatFixed(tonight.airmass, 2)}</span> at{' '}
          <span className="font-mono">{formatMinutes(tonight.utc)}</span> UTC, observable from{' '}
          <span className="font-mono">{formatMinutes(tonight.from)}</span> to{' '}
          <span className="font-mono">{formatMinutes(tonight.to)}</span>, the Moon{' '}
          {formatFixed(tonight.moonSeparation, 0)}° away.
        </>
      )}
    </p>
  );
}
