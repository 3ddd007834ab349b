import Link from 'next/link';
import { Fragment, type ReactNode } from 'react';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Figure } from '@/app/_components/ui/figure';
import { decimalsSupported, formatFixed, noValue } from '@/lib/contracts/format-figure';
import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import { calibratedFlags, type CalibratedFlag } from '@/lib/photometry/calibrated-flags';
import {
  calibratedOrder,
  cautionOfNight,
  type CalibratedPageQuery,
  type CalibratedSort,
  type NumberedStar,
} from '@/lib/contracts/calibrated-page';
import { resultsAddress } from './results-address';
import { budgetOf, countWords, meanings, type ErrorBudget, type QuantityColumn } from './star-columns';

interface StarTableProps {
  readonly night: string;
  readonly query: CalibratedPageQuery;
  readonly stars: readonly NumberedStar[];
  readonly quantities: readonly QuantityColumn[];
  /** Number of the star that is selected here and in the diagram. */
  readonly selected: number | null;
  readonly onSelect: (no: number) => void;
  /** Whether the two parts of each error are shown under it. */
  readonly showsParts: boolean;
}

/** Address of a star's row within the page. */
export const rowId = (no: number): string => `star-${no}`;

/** Calibrated magnitudes, one star a row. */
export function StarTable({ stars, quantities, selected, onSelect, showsParts, ...rest }: StarTableProps) {
  return (
    <>
      <DataTable
        caption="Calibrated magnitudes"
        maxHeight="70vh"
        head={<Head quantities={quantities} {...rest} />}
      >
        {stars.map((star) => (
          <Row key={star.no} id={rowId(star.no)} tabIndex={-1} selected={star.no === selected}>
            <Cell heading>
              <button
                type="button"
                aria-pressed={star.no === selected}
                onClick={() => onSelect(star.no)}
                className="text-left underline"
              >
                {star.star}
              </button>
            </Cell>
            {quantities.map(({ name }) => (
              <Cell key={name} numeric>
                <Budget {...budgetOf(star, name)} showsParts={showsParts} />
              </Cell>
            ))}
            <Cell wrap className="min-w-56">
              {star.flags
                .filter((name) => name !== cautionOfNight)
                .map(flagWords)
                .join('; ')}
            </Cell>
            <Cell numeric>{countWords(star)}</Cell>
            <Cell numeric>{formatFixed(star.airmass, 3)}</Cell>
            <Cell numeric>{star.ra === null ? noValue : formatRightAscension(star.ra)}</Cell>
            <Cell numeric>{star.dec === null ? noValue : formatDeclination(star.dec)}</Cell>
            <Cell numeric>{formatFixed(star.bjd_tdb, 5)}</Cell>
          </Row>
        ))}
      </DataTable>
      <Meanings quantities={quantities} />
    </>
  );
}

const flagWords = (name: string): string =>
  Object.hasOwn(calibratedFlags, name) ? calibratedFlags[name as CalibratedFlag].words : name;

function Budget({
  value,
  total,
  random,
  systematic,
  showsParts,
}: ErrorBudget & { readonly showsParts: boolean }) {
  // The parts have the decimals of their sum, so that one sees how they make it.
  const decimals = total === null || total <= 0 ? 3 : Math.max(0, decimalsSupported(total));
  return (
    <>
      <Figure value={value} error={total} />
      {showsParts && value !== null ? (
        <span className="block text-small text-ink-2">
          {formatFixed(random, decimals)} random, {formatFixed(systematic, decimals)} systematic
        </span>
      ) : null}
    </>
  );
}

type HeadProps = Pick<StarTableProps, 'night' | 'query' | 'quantities'>;

function Head({ quantities, ...rest }: HeadProps) {
  return (
    <Row>
      <SortedHead {...rest} by="star">
        Star
      </SortedHead>
      {quantities.map(({ name, label }) => (
        <SortedHead key={name} {...rest} by={name} unit="mag" numeric>
          {label}
        </SortedHead>
      ))}
      <HeadCell>Cautions</HeadCell>
      <SortedHead {...rest} by="n_V" unit="used" numeric>
        Measurements
      </SortedHead>
      <SortedHead {...rest} by="airmass" unit="mean" numeric>
        Airmass
      </SortedHead>
      <SortedHead {...rest} by="ra" unit="J2000" numeric>
        Right ascension
      </SortedHead>
      <HeadCell numeric unit="J2000">
        Declination
      </HeadCell>
      <HeadCell numeric unit="TDB, days">
        BJD
      </HeadCell>
    </Row>
  );
}

interface SortedHeadProps extends Omit<HeadProps, 'quantities'> {
  readonly by: CalibratedSort;
  readonly unit?: ReactNode;
  readonly numeric?: boolean;
  readonly children: ReactNode;
}

/** The head of a column is a link that sorts by it; pressed again, the other way round. */
function SortedHead({ night, query, by, unit, numeric = false, children }: SortedHeadProps) {
  const { sort, descending } = calibratedOrder(query);
  const isSorted = sort === by;
  const descends = isSorted && descending;
  const href = resultsAddress(night, query, {
    sort: by,
    descending: isSorted && !descends,
    page: undefined,
    at: undefined,
  });
  return (
    <HeadCell
      numeric={numeric}
      unit={unit}
      aria-sort={isSorted ? (descends ? 'descending' : 'ascending') : undefined}
    >
      <Link href={href} scroll={false} className="text-inherit underline decoration-dotted">
        {children}
        {isSorted ? <span aria-hidden="true"> {descends ? '▼' : '▲'}</span> : null}
      </Link>
    </HeadCell>
  );
}

function Meanings({ quantities }: { readonly quantities: readonly QuantityColumn[] }) {
  return (
    <details className="border-t border-rule px-3.5 py-2.5 text-table">
      <summary className="min-h-6 text-ink-2 underline">What the columns mean</summary>
      <dl className="mt-2 grid max-w-prose gap-x-3.5 gap-y-1 sm:grid-cols-[auto_1fr]">
        {meanings(quantities).map(({ term, meaning }) => (
          <Fragment key={term}>
            <dt className="font-medium">{term}</dt>
            <dd className="text-ink-2">{meaning}</dd>
          </Fragment>
        ))}
      </dl>
    </details>
  );
}
