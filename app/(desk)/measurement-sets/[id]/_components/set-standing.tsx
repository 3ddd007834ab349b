import { Finding } from '@/app/_components/ui/finding';
import { formatCount } from '@/lib/contracts/format-figure';
import { hasEnded } from '@/lib/contracts/api/job';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import type { SetPage } from '@/lib/contracts/set-page';
import { Checking } from './checking';

const many = (count: number, one: string, more: string): string =>
  `${formatCount(count)} ${count === 1 ? one : more}`;

/** How the set stands, in a sentence or two: the first thing that a person wants to know. */
export function SetStanding({ page }: { readonly page: SetPage }) {
  const { set } = page;
  switch (set.state) {
    case 'received':
    case 'checked':
      return <Unfinished set={set} />;
    case 'refused':
      return <Refused set={set} />;
    case 'matched':
    case 'in use':
      return <Taken page={page} />;
  }
}

function Unfinished({ set }: { readonly set: MeasurementSet }) {
  if (set.job !== null && !hasEnded(set.job.state)) return <Checking set={set.id} job={set.job} />;
  const why =
    set.job?.state === 'cancelled' ? 'Its check was cancelled.' : 'Its check could not be finished.';
  return (
    <Finding tone="warn" word="Not checked">
      {why} Nothing of the table has been taken.{' '}
      {set.may_check ? 'Check it again, or upload another table.' : 'Whoever uploaded it can check it again.'}
    </Finding>
  );
}

function Refused({ set }: { readonly set: MeasurementSet }) {
  if (set.faults === 0)
    return (
      <Finding tone="bad" word="Taken back">
        Nothing of the table is in use; the original is kept.
      </Finding>
    );
  return (
    <Finding tone="bad" word="Refused">
      {many(set.faults, 'fault was', 'faults were')} found in {many(set.rows ?? 0, 'row', 'rows')}, so nothing
      of the table was taken. Mend it and upload it again.
    </Finding>
  );
}

function Taken({ page: { set, summary } }: { readonly page: SetPage }) {
  const matched = summary.tally.filter(({ matchedBy }) => matchedBy !== null);
  const stars = matched.reduce((sum, { nStars }) => sum + nStars, 0);
  const cautions = matched.reduce((sum, { nCautions }) => sum + nCautions, 0);
  const byName = matched.find(({ matchedBy }) => matchedBy === 'name')?.nStars ?? 0;
  const unmatched = summary.tally.filter(({ matchedBy }) => matchedBy === null);
  const others = unmatched.reduce((sum, { nStars }) => sum + nStars, 0);
  if (set.kind === 'target') {
    return (
      <Finding tone="good" word="Taken">
        {many(set.rows ?? 0, 'row', 'rows')} of {many(others, 'star', 'stars')} on{' '}
        {many(summary.frames.length, 'frame', 'frames')}. As targets, they are not looked for among the
        standards.
      </Finding>
    );
  }
  return (
    <div className="grid gap-2">
      <Finding tone={stars > 0 ? 'good' : 'warn'} word={stars > 0 ? 'Taken' : 'Taken, but'}>
        {stars === 0
          ? `none of its ${many(others, 'star', 'stars')} is a standard star: a calibration can use nothing of it.`
          : `${many(stars, 'standard star', 'standard stars')} found, ${howFound(stars, byName)}${rowWords(set)}.`}{' '}
        {stars > 0 && others > 0 ? `${many(others, 'other star', 'other stars')} besides.` : null}
      </Finding>
      {cautions === 0 ? null : (
        <Finding tone="warn">
          {many(cautions, 'star', 'stars')} matched with a caution: name and position do not agree.
        </Finding>
      )}
    </div>
  );
}

function howFound(stars: number, byName: number): string {
  if (byName === stars) return stars === 1 ? 'by name' : 'all by name';
  if (byName === 0) return stars === 1 ? 'by position' : 'all by position';
  return `${formatCount(byName)} by name and ${formatCount(stars - byName)} by position`;
}

/** How much of the table they are; not told where somebody sees a part of it. */
const rowWords = ({ matched_rows, rows }: MeasurementSet): string =>
  matched_rows === null ? '' : `, in ${formatCount(matched_rows)} of ${many(rows ?? 0, 'row', 'rows')}`;
