import type { KeyboardEvent } from 'react';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Figure } from '@/app/_components/ui/figure';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { noValue } from '@/lib/contracts/format-figure';
import type { FieldStar } from './field-star';

interface StarTableProps {
  /** Of the table; each row's button is `id-index`. */
  readonly id: string;
  readonly stars: readonly FieldStar[];
  readonly active: number;
  readonly onPoint: (index: number) => void;
}

const magnitudes = [
  { label: 'V', value: ({ v }: FieldStar) => v, error: ({ eV }: FieldStar) => eV },
  { label: 'B−V', value: ({ bv }: FieldStar) => bv, error: ({ eBv }: FieldStar) => eBv },
  { label: 'U−B', value: ({ ub }: FieldStar) => ub, error: ({ eUb }: FieldStar) => eUb },
  { label: 'V−R', value: ({ vr }: FieldStar) => vr, error: ({ eVr }: FieldStar) => eVr },
  { label: 'R−I', value: ({ ri }: FieldStar) => ri, error: ({ eRi }: FieldStar) => eRi },
  { label: 'V−I', value: ({ vi }: FieldStar) => vi, error: ({ eVi }: FieldStar) => eVi },
] as const;

/** Where each key leads from a row of so many. */
function rowAfter(key: string, from: number, count: number): number | null {
  switch (key) {
    case 'ArrowDown':
      return Math.min(count - 1, from + 1);
    case 'ArrowUp':
      return Math.max(0, from - 1);
    case 'Home':
      return 0;
    case 'End':
      return count - 1;
    default:
      return null;
  }
}

export function StarTable({ id, stars, active, onPoint }: StarTableProps) {
  const onKeyDown = (event: KeyboardEvent, index: number): void => {
    const next = rowAfter(event.key, index, stars.length);
    if (next === null) return;
    event.preventDefault();
    document.getElementById(`${id}-${next}`)?.focus();
  };
  return (
    <DataTable
      caption="Standard stars of the field"
      maxHeight="46rem"
      head={
        <Row>
          <HeadCell>Star</HeadCell>
          <HeadCell>Use</HeadCell>
          {magnitudes.map(({ label }) => (
            <HeadCell key={label} numeric unit="mag">
              {label}
            </HeadCell>
          ))}
          <HeadCell numeric unit="J2000">
            Right ascension
          </HeadCell>
          <HeadCell numeric unit="J2000">
            Declination
          </HeadCell>
          <HeadCell numeric>Observations</HeadCell>
        </Row>
      }
    >
      {stars.map((star, index) => (
        <Row key={star.name} selected={index === active} onMouseEnter={() => onPoint(index)}>
          <Cell heading>
            <button
              id={`${id}-${index}`}
              type="button"
              tabIndex={index === active ? 0 : -1}
              aria-pressed={index === active}
              onFocus={() => onPoint(index)}
              onClick={() => onPoint(index)}
              onKeyDown={(event) => onKeyDown(event, index)}
              className="min-h-6 rounded-tag px-1 text-left font-medium"
            >
              {star.name}
            </button>
          </Cell>
          <Cell wrap={star.caution !== ''}>
            {star.isUsable ? 'yes' : <span className="font-medium text-bad">✕ no</span>}
            {star.caution === '' ? null : <span className="block text-small text-ink-2">{star.caution}</span>}
          </Cell>
          {magnitudes.map(({ label, value, error }) => (
            <Cell key={label} numeric>
              <Figure value={value(star)} error={error(star)} />
            </Cell>
          ))}
          <Cell numeric>{formatRightAscension(star.ra, 2)}</Cell>
          <Cell numeric>{formatDeclination(star.dec, 1)}</Cell>
          <Cell numeric>{star.nObservations ?? noValue}</Cell>
        </Row>
      ))}
    </DataTable>
  );
}
