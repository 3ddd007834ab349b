import Link from 'next/link';
import type { Route } from 'next';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { formatFixed } from '@/lib/contracts/format-figure';
import type { Standard } from '@/lib/contracts/api/standard';
import type { List } from '@/lib/contracts/common';
import { fieldSlug } from '@/lib/contracts/field-slug';

/** Stars that a search by name found. */
export function StarHits({ hits }: { readonly hits: List<Standard> }) {
  if (hits.items.length === 0) {
    return (
      <p className="px-3.5 py-3 text-ink-2">
        No standard star is named so. Names are compared without blanks, hyphens and capitals; try a shorter
        part of it.
      </p>
    );
  }
  return (
    <>
      <DataTable
        caption="Standard stars found by name"
        maxHeight="20rem"
        head={
          <Row>
            <HeadCell>Star</HeadCell>
            <HeadCell>Field</HeadCell>
            <HeadCell numeric unit="J2000">
              Right ascension
            </HeadCell>
            <HeadCell numeric unit="J2000">
              Declination
            </HeadCell>
            <HeadCell numeric unit="mag">
              V
            </HeadCell>
            <HeadCell numeric unit="mag">
              B−V
            </HeadCell>
            <HeadCell>Caution</HeadCell>
          </Row>
        }
      >
        {hits.items.map((star) => (
          <Row key={star.name}>
            <Cell heading>{star.name}</Cell>
            <Cell>
              <Link
                href={`/standards/${fieldSlug(star.field)}?star=${encodeURIComponent(star.name)}` as Route}
              >
                {star.field}
              </Link>
            </Cell>
            <Cell numeric>{formatRightAscension(star.ra, 2)}</Cell>
            <Cell numeric>{formatDeclination(star.dec, 1)}</Cell>
            <Cell numeric>{formatFixed(star.V, 3)}</Cell>
            <Cell numeric>{formatFixed(star.BV, 3)}</Cell>
            <Cell wrap>{star.caution}</Cell>
          </Row>
        ))}
      </DataTable>
      {hits.next === null ? null : (
        <p className="px-3.5 py-3 text-ink-2">
          These are the first {hits.items.length}; type more of the name.
        </p>
      )}
    </>
  );
}
