import type { Band } from '@/lib/contracts/bands';
import { bandShape } from './band-shape';
import { classNames } from './class-names';

/** Each band's colour, for what is drawn of it. */
export const bandColour: Readonly<Record<Band, string>> = {
  U: 'fill-band-U stroke-band-U',
  B: 'fill-band-B stroke-band-B',
  V: 'fill-band-V stroke-band-V',
  R: 'fill-band-R stroke-band-R',
  I: 'fill-band-I stroke-band-I',
};

interface BandMarkProps {
  readonly band: Band;
  readonly hollow?: boolean;
  readonly className?: string;
}

/** A band's shape in its colour, for legends and tables; always beside the band's letter. */
export function BandMark({ band, hollow = false, className }: BandMarkProps) {
  return (
    <svg
      viewBox="-1.6 -1.6 3.2 3.2"
      aria-hidden="true"
      className={classNames('inline-block size-3 align-[-1px]', className)}
    >
      <path
        d={bandShape(band, { x: 0, y: 0, r: 1 })}
        strokeWidth="0.3"
        className={classNames(bandColour[band], hollow && 'fill-transparent')}
      />
    </svg>
  );
}
