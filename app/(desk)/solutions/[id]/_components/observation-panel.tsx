'use client';

import { useState } from 'react';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';
import { Button } from '@/app/_components/ui/button';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { SolutionObservation } from '@/lib/contracts/api/solution';
import { Choice } from './choice';
import { ExclusionDialog } from './exclusion-dialog';
import {
  listed,
  selectionWords,
  shownParts,
  sorted,
  widened,
  type Selection,
  type ShownPart,
  type Sorting,
} from './observation-list';
import { ObservationTable } from './observation-table';

interface ObservationPanelProps {
  readonly solution: string;
  readonly mayExclude: boolean;
  /** They are still on their way. */
  readonly isReading: boolean;
  /** Those of the chosen band and night. */
  readonly observations: readonly SolutionObservation[];
  readonly colourIndex: string | null;
  readonly hasNights: boolean;
  readonly selection: Selection;
  readonly onSelect: (selection: Selection) => void;
}

const perPage = 100;

/** The table of observations: what is shown of it, what is selected, and what can be done with those. */
export function ObservationPanel(props: ObservationPanelProps) {
  const { solution, mayExclude, isReading, observations, colourIndex, hasNights, selection, onSelect } =
    props;
  const [part, setPart] = useState<ShownPart>('all');
  const [sorting, setSorting] = useState<Sorting | null>(null);
  const [page, setPage] = useState(0);
  const [asked, setAsked] = useState<'reject' | 'restore' | null>(null);
  const hasSelected = selection.size > 0;
  useShortcut('X', () => setAsked('reject'), mayExclude && hasSelected);
  useShortcut('R', () => setAsked('restore'), mayExclude && hasSelected);
  const rows = sorted(listed(observations, part, selection), sorting);
  const last = Math.max(0, Math.ceil(rows.length / perPage) - 1);
  const shown = Math.min(page, last);
  const words = selectionWords(observations, selection);
  const widen = (by: 'star' | 'frame') => onSelect(widened(observations, selection, by));
  return (
    <Panel
      title="Observations"
      note={<span role="status">{words}</span>}
      flush
      actions={
        mayExclude ? (
          <>
            <Button shortcut="X" disabled={!hasSelected} onClick={() => setAsked('reject')}>
              Reject with reason
            </Button>
            <Button shortcut="R" disabled={!hasSelected} onClick={() => setAsked('restore')}>
              Restore
            </Button>
          </>
        ) : null
      }
    >
      <div className="flex flex-wrap items-center gap-x-5 gap-y-1 border-b border-rule px-3.5 py-1.5">
        <Choice
          label="Shown"
          value={part}
          onChange={setPart}
          options={shownParts.map((value) => ({
            value,
            words: `${value} ${formatCount(listed(observations, value, selection).length)}`,
          }))}
        />
        <span className="ml-auto flex flex-wrap gap-2">
          <Button look="quiet" disabled={!hasSelected} onClick={() => widen('star')}>
            Select star
          </Button>
          <Button look="quiet" disabled={!hasSelected} onClick={() => widen('frame')}>
            Select frame
          </Button>
          <Button look="quiet" disabled={!hasSelected} onClick={() => onSelect(new Set())}>
            Select none
          </Button>
        </span>
      </div>
      {rows.length === 0 ? (
        <NoRows part={part} isReading={isReading} />
      ) : (
        <ObservationTable
          rows={rows.slice(shown * perPage, (shown + 1) * perPage)}
          {...{ colourIndex, hasNights, sorting, selection, onSelect }}
          onSort={(next) => {
            setSorting(next);
            setPage(0);
          }}
        />
      )}
      {last === 0 ? null : <Pages page={shown} last={last} nRows={rows.length} onPage={setPage} />}
      {asked === null ? null : (
        <ExclusionDialog
          solution={solution}
          observations={[...selection]}
          words={words}
          restore={asked === 'restore'}
          onClose={() => setAsked(null)}
        />
      )}
    </Panel>
  );
}

function NoRows({ part, isReading }: { readonly part: ShownPart; readonly isReading: boolean }) {
  if (isReading) return <p className="px-3.5 py-3 text-ink-2">The observations are being read …</p>;
  if (part === 'selected') {
    return (
      <EmptyState title="None selected">
        A click on a mark or on a row selects it; a drag over a plot selects all in the box.
      </EmptyState>
    );
  }
  return (
    <EmptyState title={part === 'rejected' ? 'None rejected' : 'No observations'}>
      {part === 'rejected' ? 'The fit used every observation.' : 'There are none of this band and night.'}
    </EmptyState>
  );
}

interface PagesProps {
  readonly page: number;
  readonly last: number;
  readonly nRows: number;
  readonly onPage: (page: number) => void;
}

function Pages({ page, last, nRows, onPage }: PagesProps) {
  return (
    <nav aria-label="Pages of observations" className="flex flex-wrap items-center gap-2 px-3.5 py-3">
      <Button disabled={page === 0} onClick={() => onPage(0)}>
        First
      </Button>
      <Button disabled={page === 0} onClick={() => onPage(page - 1)}>
        Previous
      </Button>
      <Button disabled={page === last} onClick={() => onPage(page + 1)}>
        Next
      </Button>
      <span className="text-small text-ink-2">
        {formatCount(page * perPage + 1)} to {formatCount(Math.min(nRows, (page + 1) * perPage))} of{' '}
        {formatCount(nRows)}
      </span>
    </nav>
  );
}
