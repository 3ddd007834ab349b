'use client';

import Link from 'next/link';
import type { Route } from 'next';
import { standingOf } from '@/app/_components/solutions/solution-words';
import { SolveProgress } from '@/app/_components/solutions/solve-progress';
import { VerdictTag } from '@/app/_components/solutions/verdict-tag';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount, formatFixed } from '@/lib/contracts/format-figure';
import { formatInstant } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import type { Solution } from '@/lib/contracts/api/solution';
import { bands } from '@/lib/contracts/bands';

interface SolutionListProps {
  readonly solutions: readonly Solution[];
  readonly canBegin: boolean;
  /** A solve has come to its end. */
  readonly onEnd: () => void;
}

/** Every solution of the night with its state; those that are being solved say how far they are. */
export function SolutionList({ solutions, canBegin, onEnd }: SolutionListProps) {
  if (solutions.length === 0) {
    return (
      <Panel title="Solutions">
        <EmptyState title="No solution yet">
          Each solve of the night is a line here: how well it fits, what it says of the night, and whether it
          has been proposed and approved. {canBegin ? 'Begin with the usual model above.' : null}
        </EmptyState>
      </Panel>
    );
  }
  return (
    <Panel title="Solutions" note="the newest first" flush>
      <DataTable caption="Solutions of the night" head={<Head />}>
        {solutions.map((solution) => (
          <SolutionRow key={solution.id} solution={solution} onEnd={onEnd} />
        ))}
      </DataTable>
    </Panel>
  );
}

function Head() {
  return (
    <Row>
      <HeadCell numeric>Solution</HeadCell>
      <HeadCell>State</HeadCell>
      <HeadCell>Verdict</HeadCell>
      <HeadCell numeric unit="mag, by band">
        Scatter
      </HeadCell>
      <HeadCell numeric>Used</HeadCell>
      <HeadCell numeric>Rejected</HeadCell>
      <HeadCell>Asked for</HeadCell>
    </Row>
  );
}

interface SolutionRowProps {
  readonly solution: Solution;
  readonly onEnd: () => void;
}

function SolutionRow({ solution, onEnd }: SolutionRowProps) {
  const standing = standingOf(solution);
  const isSolved = solution.outcome !== null;
  return (
    <>
      <Row>
        <Cell heading numeric>
          <Link href={`/solutions/${solution.id}` as Route} aria-label={`Solution ${solution.number}`}>
            {solution.number}
          </Link>
        </Cell>
        <Cell>
          <StateTag state={solution.state} />
        </Cell>
        <Cell>
          {standing === 'undetermined' ? (
            <StateTag state="not determined" tone="bad" />
          ) : (
            <VerdictTag solution={solution} />
          )}
          {standing === 'not finished' ? (
            <span className="text-ink-2">
              {solution.job?.state === 'cancelled' ? 'cancelled' : 'could not be solved'}
            </span>
          ) : null}
        </Cell>
        <Cell numeric>{scatterWords(solution)}</Cell>
        <Cell numeric>{isSolved ? formatCount(solution.n_used) : '–'}</Cell>
        <Cell numeric>{isSolved ? formatCount(solution.n_rejected) : '–'}</Cell>
        <Cell>
          {formatInstant(solution.created_at)}
          <span className="text-ink-2"> by {solution.created_by}</span>
        </Cell>
      </Row>
      {standing === 'running' && solution.job !== null ? (
        <tr>
          <td colSpan={7} className="border-b border-rule px-3.5 pb-3">
            <SolveProgress solution={solution.id} job={solution.job} onEnd={onEnd} />
          </td>
        </tr>
      ) : null}
    </>
  );
}

/** Scatter of a single observation, its own and its frame's together: `B 0.009, V 0.008`. */
function scatterWords(solution: Solution): string {
  const parts = bands.flatMap((band) => {
    const scatter = solution.bands[band]?.scatter;
    if (scatter === undefined || scatter.observation === null) return [];
    return [`${band} ${formatFixed(Math.hypot(scatter.observation, scatter.frame ?? 0), 3)}`];
  });
  return parts.length === 0 ? '–' : parts.join(', ');
}
