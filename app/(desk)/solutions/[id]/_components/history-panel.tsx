import Link from 'next/link';
import type { Route } from 'next';
import { formatInstant } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import type { SolutionPage } from '@/lib/contracts/solution-page';

/** Acts on a solution as one says them; another stands as the trail has it. */
const actWords: Readonly<Record<string, string>> = {
  'solution.queue': 'Solve asked for',
  'solution.solve': 'Solved',
  'solution.exclude': 'Observations kept out or in',
  'solution.propose': 'Proposed',
  'solution.approve': 'Approved',
  'solution.transform': 'Targets transformed',
  'solution.supersede': 'Superseded',
  'solution.withdraw': 'Withdrawn',
  'solution.comment': 'Commented',
};

/** What the audit trail has about the solution, the latest first. */
export function HistoryPanel({ page: { solution, history } }: { readonly page: SolutionPage }) {
  if (history.length === 0) return null;
  return (
    <Panel
      title="History"
      note="the latest first"
      actions={
        <Link href={`/audit?subject=${solution.id}` as Route} className="text-small text-ink-2">
          Whole trail
        </Link>
      }
    >
      <ul className="grid gap-2 text-table">
        {history.map(({ id, utc, person, act, reason }) => (
          <li key={id}>
            {actWords[act] ?? <span className="font-mono">{act}</span>} by {person ?? 'the service'}
            <span className="block text-small text-ink-2">
              {formatInstant(utc)}
              {reason === '' ? '' : `: ${reason}`}
            </span>
          </li>
        ))}
      </ul>
    </Panel>
  );
}
