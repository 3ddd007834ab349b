import { bandShape, crossShape, tickShape, triangleShape, type Spot } from '@/app/_components/ui/band-shape';
import { classNames } from '@/app/_components/ui/class-names';
import type { Mark, MarkShape, RowName } from './frame-marks';

const fills: Readonly<Record<RowName, string>> = {
  U: 'fill-band-U',
  B: 'fill-band-B',
  V: 'fill-band-V',
  R: 'fill-band-R',
  I: 'fill-band-I',
  other: 'fill-sky-ink',
};

function outline({ shape, row }: Mark, spot: Spot): string {
  switch (shape) {
    case 'focus':
      return triangleShape(spot);
    case 'test':
      return crossShape(spot);
    case 'tick':
      return tickShape(spot);
    default:
      return row === 'other' ? tickShape(spot) : bandShape(row, spot);
  }
}

function look(shape: MarkShape, row: RowName): string {
  if (shape === 'full') return fills[row];
  return shape === 'focus' ? 'fill-sky-ink' : 'fill-none';
}

/** All marks of one row and shape as one path: a night of thousands of frames stays a dozen elements. */
export function MarkPaths({ marks, size }: { readonly marks: readonly Mark[]; readonly size: number }) {
  const paths = new Map<string, { readonly row: RowName; readonly shape: MarkShape; d: string }>();
  for (const mark of marks) {
    const key = `${mark.row} ${mark.shape}`;
    const path = paths.get(key) ?? { row: mark.row, shape: mark.shape, d: '' };
    path.d += outline(mark, { x: mark.x, y: mark.y, r: size });
    paths.set(key, path);
  }
  return [...paths].map(([key, { row, shape, d }]) => (
    <path
      key={key}
      d={d}
      strokeWidth="1.4"
      className={classNames(
        'stroke-sky-ink',
        // One red for all: a dark edge keeps neighbours apart.
        shape === 'full' && 'dark-site:stroke-sky-night dark-site:[stroke-width:0.7]',
        look(shape, row),
      )}
    />
  ));
}
