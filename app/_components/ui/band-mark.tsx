import type { Band } from '@/lib/contracts/bands';
import { classNames } from './class-names';

/** One closed shape per band, about the origin, of like area; half width 1. */
export const bandShapes: Readonly<Record<Band, string>> = {
  U: 'M-1.1 -0.85H1.1L0 1.15Z',
  B: 'M-1 0a1 1 0 1 0 2 0a1 1 0 1 0 -2 0Z',
  V: 'M-0.9 -0.9H0.9V0.9H-0.9Z',
  R: 'M0 -1.25L1.25 0L0 1.25L-1.25 0Z',
  I: 'M0 -1.15L1.09 -0.36L0.68 0.93H-0.68L-1.09 -0.36Z',
};

const bandFill: Readonly<Record<Band, string>> = {
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
        d={bandShapes[band]}
        strokeWidth="0.3"
        className={classNames(bandFill[band], hollow && 'fill-transparent')}
      />
    </svg>
  );
}
