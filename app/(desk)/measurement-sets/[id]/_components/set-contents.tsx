import { Finding } from '@/app/_components/ui/finding';
import { formatCount } from '@/lib/contracts/format-figure';
import { Tabs } from '@/app/_components/ui/tabs';
import type { SetPage, SetPart } from '@/lib/contracts/set-page';
import { FaultTable } from './fault-table';
import { partAddress } from './part-address';
import { RowTable } from './row-table';
import { StarTable } from './star-table';

/** What is in the set: stars that are standards, the others with the reasons, the rows; or what was wrong with the table. */
export function SetContents({ page }: { readonly page: SetPage }) {
  const { set, contents } = page;
  if (contents === null) {
    return set.state === 'refused' ? (
      <Finding tone="warn" word="Not shown">
        What was wrong with the table is for whoever uploaded it, and for the night’s observers.
      </Finding>
    ) : null;
  }
  const links = {
    first: page.after === null ? null : partAddress(set.id, { part: contents.part, reason: reasonOf(page) }),
    next:
      contents.list.next === null
        ? null
        : partAddress(set.id, { part: contents.part, reason: reasonOf(page), after: contents.list.next }),
  };
  return (
    <div>
      {contents.part === 'faults' ? null : <Parts page={page} current={contents.part} />}
      {contents.part === 'faults' ? (
        <FaultTable set={set} faults={contents.list.items} links={links} />
      ) : null}
      {contents.part === 'rows' ? <RowTable rows={contents.list.items} links={links} /> : null}
      {contents.part === 'matched' || contents.part === 'others' ? (
        <StarTable page={page} contents={contents} links={links} />
      ) : null}
    </div>
  );
}

const reasonOf = ({ contents }: SetPage): string | null =>
  contents?.part === 'matched' || contents?.part === 'others' ? contents.reason : null;

function Parts({ page: { set, summary }, current }: { readonly page: SetPage; readonly current: SetPart }) {
  const stars = (isMatched: boolean): number =>
    summary.tally
      .filter(({ matchedBy }) => (matchedBy !== null) === isMatched)
      .reduce((sum, { nStars }) => sum + nStars, 0);
  const rows = summary.frames.reduce((sum, { nRows }) => sum + nRows, 0);
  const all: readonly (readonly [SetPart, string, number])[] = [
    ['matched', 'Standard stars', stars(true)],
    ['others', set.kind === 'target' ? 'Stars' : 'Other stars', stars(false)],
    ['rows', 'Rows', rows],
  ];
  const shown = set.kind === 'target' ? all.filter(([part]) => part !== 'matched') : all;
  return (
    <Tabs
      label="Parts of the set"
      tabs={shown.map(([part, label, count]) => ({
        href: partAddress(set.id, { part }),
        label,
        count: formatCount(count),
        isCurrent: part === current,
      }))}
    />
  );
}
