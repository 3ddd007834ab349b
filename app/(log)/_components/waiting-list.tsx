import Link from 'next/link';
import { formatCount } from '@/app/_components/ui/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Waiting } from '@/lib/contracts/waiting';
import { waitingLines, type WaitingLine } from './waiting-lines';

/** What the person can do next, by what they may do; nothing at all where nothing waits. */
export function WaitingList({ waiting }: { readonly waiting: Waiting }) {
  const lines = waitingLines(waiting);
  if (lines.length === 0) return null;
  return (
    <Panel title="Waiting for you" className="mb-5" flush>
      <dl>
        {lines.map((line) => (
          <Line key={line.title} line={line} />
        ))}
      </dl>
    </Panel>
  );
}

function Line({ line: { title, n, things, all } }: { readonly line: WaitingLine }) {
  return (
    <div className="grid gap-x-5 gap-y-1 border-b border-rule px-3.5 py-2.5 last:border-b-0 md:grid-cols-[15rem_1fr]">
      <dt>
        <span className="mr-2 inline-block min-w-6 text-right font-mono font-semibold">{formatCount(n)}</span>
        {title}
      </dt>
      <dd className="min-w-0">
        <ul className="grid gap-1">
          {things.map(({ href, words, detail = '' }) => (
            <li key={`${href} ${words}`} className="wrap-anywhere">
              <Link href={href}>{words}</Link>
              {detail === '' ? null : <span className="text-ink-2">: {detail}</span>}
            </li>
          ))}
          {all === undefined ? null : (
            <li>
              <Link href={all}>{things.length === 0 ? 'See the list' : `All ${formatCount(n)}`}</Link>
            </li>
          )}
        </ul>
      </dd>
    </div>
  );
}
