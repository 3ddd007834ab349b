'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useEffect, useState } from 'react';
import { classNames } from '@/app/_components/ui/class-names';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount } from '@/lib/contracts/format-figure';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import {
  calibratedOrder,
  type CalibratedPage,
  type CalibratedPageQuery,
  type CalibratedResult,
} from '@/lib/contracts/calibrated-page';
import { ColourMagnitude } from './colour-magnitude';
import { ResultOrigin } from './result-origin';
import { resultsAddress } from './results-address';
import { ResultsFilter } from './results-filter';
import { ResultsPages } from './results-pages';
import { quantitiesOf, sortWords } from './star-columns';
import { rowId, StarTable } from './star-table';

interface ResultsViewProps {
  readonly page: CalibratedPage;
  readonly result: CalibratedResult;
  readonly query: CalibratedPageQuery;
}

/** Where the diagram stands beside the table; beside one of many bands only where its cautions are still seen. */
const beside = 'xl:grid-cols-[minmax(0,1fr)_minmax(380px,30%)]';
const besideWide = 'min-[1600px]:grid-cols-[minmax(0,1fr)_minmax(380px,26%)]';

/** Stars and diagram of one result, linked: what is chosen in one is marked in the other. */
export function ResultsView({ page, result, query }: ResultsViewProps) {
  const router = useRouter();
  const [selected, setSelected] = useState<number | null>(query.at ?? null);
  const [showsParts, setShowsParts] = useState(false);
  const { stars } = result;
  const find = useCallback(
    (no: number) => {
      setSelected(no);
      if (stars.some((star) => star.no === no)) showRow(no);
      // Its row is on another page.
      else router.push(resultsAddress(page.night, query, { at: no, page: undefined }), { scroll: false });
    },
    [stars, router, page.night, query],
  );
  useEffect(() => {
    if (query.at !== undefined) showRow(query.at);
  }, [query.at]);
  const { sort, descending } = calibratedOrder(query);
  const order = `by ${sortWords[sort]}${descending ? ', descending' : ''}`;
  const quantities = quantitiesOf(result.has);
  const isWide = quantities.length > 4;
  return (
    <div className={classNames('grid grid-cols-1 items-start gap-5', isWide ? besideWide : beside)}>
      <Panel
        title="Calibrated magnitudes"
        note={`${formatCount(result.nShown)} of ${formatCount(result.nStars)} stars, ${order}`}
        actions={
          <Checkbox
            label="Parts of the errors"
            checked={showsParts}
            onChange={(event) => setShowsParts(event.target.checked)}
          />
        }
        flush
      >
        <ResultsFilter page={page} query={query} />
        {stars.length === 0 ? (
          <NoStar page={page} />
        ) : (
          <StarTable
            night={page.night}
            query={query}
            stars={stars}
            quantities={quantities}
            selected={selected}
            onSelect={setSelected}
            showsParts={showsParts}
          />
        )}
        {stars.length === 0 ? null : <ResultsPages night={page.night} query={query} result={result} />}
      </Panel>
      <div
        className={classNames(
          'grid content-start items-start gap-5',
          isWide && 'lg:max-[1600px]:grid-cols-[minmax(0,1fr)_minmax(0,1fr)]',
        )}
      >
        <Panel title="Colour–magnitude diagram" note="the stars of the list that have V and B−V">
          {result.diagram.length === 0 ? (
            <p className="text-ink-2">No star of the list has both V and B−V.</p>
          ) : (
            <ColourMagnitude
              stars={result.diagram}
              nStars={result.nDiagram}
              selected={selected}
              onSelect={find}
            />
          )}
        </Panel>
        <ResultOrigin page={page} result={result} />
      </div>
    </div>
  );
}

function showRow(no: number): void {
  const row = document.getElementById(rowId(no));
  row?.scrollIntoView({ block: 'nearest' });
  row?.focus({ preventScroll: true });
}

function NoStar({ page }: { readonly page: CalibratedPage }) {
  const all = resultsAddress(page.night, page.programme === null ? {} : { programme: page.programme });
  return (
    <EmptyState title="No star is like that" action={<LinkButton href={all}>All stars</LinkButton>}>
      Widen the ranges, shorten the name, or let stars with cautions in.
    </EmptyState>
  );
}
