import Link from 'next/link';
import type { Route } from 'next';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount, formatFixed, noValue } from '@/lib/contracts/format-figure';
import { Pagination } from '@/app/_components/ui/pagination';
import { Panel } from '@/app/_components/ui/panel';
import type { MeasuredStar } from '@/lib/contracts/api/measurement-set';
import type { SetPage, SetPartContents } from '@/lib/contracts/set-page';
import { Reasons } from './reasons';
import type { PageLinks } from './page-links';

interface StarTableProps {
  readonly page: SetPage;
  readonly contents: Extract<SetPartContents, { readonly part: 'matched' | 'others' }>;
  readonly links: PageLinks;
}

/** Distinct stars of the set: which standard each is and how that was found, or why it is none. */
export function StarTable({ page, contents, links }: StarTableProps) {
  const isMatched = contents.part === 'matched';
  const { items } = contents.list;
  // Targets are not looked for among the standards, so there is nothing to say about why they are none.
  const hasReasons = page.set.kind !== 'target';
  return (
    <div className="grid grid-cols-1 gap-5">
      {isMatched ? null : <Reasons page={page} chosen={contents.reason} />}
      <Panel flush>
        {items.length === 0 ? (
          <EmptyState title={isMatched ? 'No standard star' : 'No other star'}>
            {isMatched
              ? 'No star of this table was found among the standards; the other stars say why.'
              : 'Every star of this table is a standard star.'}
          </EmptyState>
        ) : (
          <DataTable
            caption={isMatched ? 'Stars that are standards' : 'Stars that are no standards'}
            head={<Head isMatched={isMatched} hasReasons={hasReasons} />}
          >
            {items.map((star) => (
              <StarRow key={star.number} star={star} isMatched={isMatched} hasReasons={hasReasons} />
            ))}
          </DataTable>
        )}
        <Pagination noun="stars" {...links} />
      </Panel>
    </div>
  );
}

interface Shown {
  readonly isMatched: boolean;
  readonly hasReasons: boolean;
}

function Head({ isMatched, hasReasons }: Shown) {
  return (
    <Row>
      <HeadCell>Star</HeadCell>
      <HeadCell numeric unit="J2000">
        Right ascension
      </HeadCell>
      <HeadCell numeric unit="J2000">
        Declination
      </HeadCell>
      <HeadCell numeric>Rows</HeadCell>
      <HeadCell numeric>First line</HeadCell>
      {isMatched ? (
        <>
          <HeadCell>Standard</HeadCell>
          <HeadCell>Found by</HeadCell>
          <HeadCell numeric unit="arcsec">
            Separation
          </HeadCell>
          <HeadCell numeric unit="mag, published">
            V
          </HeadCell>
          <HeadCell numeric unit="mag, published">
            B−V
          </HeadCell>
        </>
      ) : null}
      {hasReasons ? <HeadCell>{isMatched ? 'Caution' : 'Why not'}</HeadCell> : null}
    </Row>
  );
}

function StarRow({ star, isMatched, hasReasons }: Shown & { readonly star: MeasuredStar }) {
  const { standard } = star;
  return (
    <Row>
      <Cell heading>{star.name === '' ? <span className="text-ink-2">by position</span> : star.name}</Cell>
      <Cell numeric>{star.ra === null ? noValue : formatRightAscension(star.ra, 2)}</Cell>
      <Cell numeric>{star.dec === null ? noValue : formatDeclination(star.dec, 1)}</Cell>
      <Cell numeric>{formatCount(star.rows)}</Cell>
      <Cell numeric>{formatCount(star.first_line)}</Cell>
      {isMatched ? (
        <>
          <Cell>
            {standard === null ? null : (
              <Link
                href={
                  `/standards/${encodeURIComponent(standard.field)}?star=${encodeURIComponent(standard.name)}` as Route
                }
              >
                {standard.name}
              </Link>
            )}
          </Cell>
          <Cell>{star.matched_by}</Cell>
          <Cell numeric>{star.separation === null ? noValue : formatFixed(star.separation, 2)}</Cell>
          <Cell numeric>{formatFixed(standard?.V, 3)}</Cell>
          <Cell numeric>{formatFixed(standard?.BV, 3)}</Cell>
        </>
      ) : null}
      {hasReasons ? (
        <Cell wrap className={isMatched ? 'text-warn' : undefined}>
          {star.reason}
        </Cell>
      ) : null}
    </Row>
  );
}
