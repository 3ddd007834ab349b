'use client';

import dynamic from 'next/dynamic';
import { useMemo, useState, type ReactNode } from 'react';
import { indexWords } from '@/app/_components/solutions/solution-words';
import { BandMark } from '@/app/_components/ui/band-mark';
import { Button } from '@/app/_components/ui/button';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { formatCount } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Solution } from '@/lib/contracts/api/solution';
import { bands, type Band } from '@/lib/contracts/bands';
import { Choice } from './choice';
import { plotted, selectionWords, type Selection } from './observation-list';
import { ObservationPanel } from './observation-panel';
import { useObservations, type Observations } from '@/app/_components/solutions/use-observations';

/** The chart library is large: it comes when there is something to draw. */
const ResidualCharts = dynamic(() => import('./residual-charts').then((part) => part.ResidualCharts), {
  ssr: false,
  loading: () => <p className="py-8 text-ink-2">Drawing …</p>,
});

const none: Selection = new Set();

interface SolutionDeskProps {
  readonly solution: Solution;
  /** Stands between plots and table. */
  readonly children: ReactNode;
}

/** Plots and table of the same observations: what is selected in one is selected in all. */
export function SolutionDesk({ solution, children }: SolutionDeskProps) {
  const observations = useObservations(solution.id);
  const { items } = observations;
  const [band, setBand] = useState<Band | null>(null);
  const [night, setNight] = useState<string | null>(null);
  const [selection, setSelection] = useState(none);
  const chosen = useMemo(() => plotted(items, { band, night }), [items, band, night]);
  // What the filter hides is not acted on either.
  const visible = useMemo(() => {
    const ids = new Set(chosen.map(({ observation }) => observation));
    return [...selection].every((id) => ids.has(id))
      ? selection
      : new Set([...selection].filter((id) => ids.has(id)));
  }, [chosen, selection]);
  const solved = bands.filter((name) => solution.bands[name] !== undefined);
  const nights = useMemo(() => [...new Set(items.map(({ night_date }) => night_date))], [items]);
  const colourIndex = sharedIndex(solution, band === null ? solved : [band]);
  return (
    <>
      <Panel
        title="Residuals"
        note={<ResidualsNote solved={solved} words={selectionWords(chosen, visible)} />}
        actions={
          <>
            {nights.length < 2 ? null : (
              <Choice
                label="Night"
                value={night ?? 'all'}
                onChange={(value) => setNight(value === 'all' ? null : value)}
                options={['all', ...nights].map((value) => ({ value, words: value }))}
              />
            )}
            <Choice
              label="Band"
              value={band ?? 'all'}
              onChange={(value) => setBand(bands.find((name) => name === value) ?? null)}
              options={[
                { value: 'all', words: solved.length === 2 ? 'both' : 'all' },
                ...solved.map((value) => ({ value, words: value })),
              ]}
            />
          </>
        }
      >
        <Standing observations={observations} total={solution.n_observations} />
        {chosen.length === 0 ? (
          observations.standing === 'whole' && (
            <EmptyState title="No observations">Nothing to draw.</EmptyState>
          )
        ) : (
          <ResidualCharts
            observations={chosen}
            colourIndex={colourIndex}
            selection={visible}
            onSelect={setSelection}
          />
        )}
      </Panel>
      {children}
      <ObservationPanel
        solution={solution.id}
        mayExclude={solution.may.exclude}
        isReading={observations.standing === 'reading'}
        observations={chosen}
        colourIndex={colourIndex}
        hasNights={nights.length > 1}
        selection={visible}
        onSelect={setSelection}
      />
    </>
  );
}

function sharedIndex(solution: Solution, names: readonly Band[]): string | null {
  const indices = new Set(names.map((name) => solution.bands[name]?.colour_index ?? ''));
  const [index] = indices;
  return indices.size === 1 && index !== undefined && index !== '' ? indexWords(index) : null;
}

function ResidualsNote({ solved, words }: { readonly solved: readonly Band[]; readonly words: string }) {
  return (
    <>
      mag, observed − fitted;{' '}
      {solved.map((name, index) => (
        <span key={name}>
          {index === 0 ? '' : ', '}
          <BandMark band={name} /> {name}
        </span>
      ))}
      ; rejected are crossed. {words.charAt(0).toUpperCase() + words.slice(1)}.
    </>
  );
}

function Standing({
  observations: { items, standing, again },
  total,
}: {
  readonly observations: Observations;
  readonly total: number;
}) {
  if (standing === 'whole') return null;
  if (standing === 'reading') {
    return (
      <p role="status" className="text-small text-ink-2">
        {formatCount(items.length)} of {formatCount(total)} observations have come …
      </p>
    );
  }
  return (
    <ErrorNotice
      title="The observations could not be read"
      fault={{ detail: `${formatCount(items.length)} of ${formatCount(total)} have come; the rest did not.` }}
      action={<Button onClick={again}>Try again</Button>}
    />
  );
}
