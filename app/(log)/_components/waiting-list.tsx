import Link from 'next/link';
import { formatCount } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Waiting } from '@/lib/contracts/waiting';
import { waitingLines, type WaitingLine, type WaitingThing } from './waiting-lines';

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

/** So many of a kind stand open, the others folded. */
const open = 5;

function Line({ line: { title, n, things, list } }: { readonly line: WaitingLine }) {
  const folded = things.slice(open);
  return (
    <div className="grid gap-x-5 gap-y-1 border-b border-rule px-3.5 py-2.5 last:border-b-0 md:grid-cols-[15rem_1fr]">
      <dt>
        <span className="mr-2 inline-block min-w-6 text-right font-mono font-semibold">{formatCount(n)}</span>
        {title}
      </dt>
      <dd className="min-w-0">
        <Things things={things.slice(0, open)} />
        {folded.length === 0 ? null : (
          <details className="mt-1">
            <summary className="min-h-6 text-ink-2 underline">{formatCount(n - open)} more</summary>
            <Things things={folded} />
            {n === things.length ? null : (
              <p className="mt-1 text-ink-2">
                and {formatCount(n - things.length)} that are named here when these are done
              </p>
            )}
          </details>
        )}
        {list === undefined ? null : <Link href={list}>See the list</Link>}
      </dd>
    </div>
  );
}

function Things({ things }: { readonly things: readonly WaitingThing[] }) {
  return (
    <ul className="grid gap-1">
      {things.map(({ href, words, detail = '' }) => (
        <li key={`${href} ${words}`} className="wrap-anywhere">
          <Link href={href}>{words}</Link>
          {detail === '' ? null : <span className="text-ink-2">: {detail}</span>}
        </li>
      ))}
    </ul>
  );
}
