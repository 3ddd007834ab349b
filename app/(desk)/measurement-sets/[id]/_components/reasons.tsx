import Link from 'next/link';
import { formatCount } from '@/lib/contracts/format-figure';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import type { SetPage } from '@/lib/contracts/set-page';
import { partAddress } from './part-address';

/** Reasons that are told; the rest, each of a star or two, stand in the table. */
const most = 8;

/** Why stars are no standards, the most common reason first; each leads to its stars. */
export function Reasons({
  page: { set, summary },
  chosen,
}: {
  readonly page: SetPage;
  readonly chosen: string | null;
}) {
  const reasons = summary.tally.filter(({ matchedBy, reason }) => matchedBy === null && reason !== '');
  if (reasons.length < 2 && chosen === null) return null;
  return (
    <Panel
      title="Why they are no standards"
      actions={
        chosen === null ? null : (
          <LinkButton href={partAddress(set.id, { part: 'others' })}>All reasons</LinkButton>
        )
      }
    >
      <ul className="grid gap-1.5 text-table">
        {reasons.slice(0, most).map(({ reason, nStars, nRows }) => (
          <li key={reason} className="flex flex-wrap gap-x-3">
            <span className="w-16 text-right font-mono">{formatCount(nStars)}</span>
            {reason === chosen ? (
              <b className="min-w-0 flex-1 font-medium">{reason}</b>
            ) : (
              <Link className="min-w-0 flex-1" href={partAddress(set.id, { part: 'others', reason })}>
                {reason}
              </Link>
            )}
            <span className="text-ink-2">
              {formatCount(nRows)} {nRows === 1 ? 'row' : 'rows'}
            </span>
          </li>
        ))}
      </ul>
    </Panel>
  );
}
