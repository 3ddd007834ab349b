import type { Route } from 'next';
import { formatCount } from '@/lib/contracts/format-figure';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import type { Waiting, WaitingNight, WaitingSolution, Waits } from '@/lib/contracts/waiting';

export interface WaitingThing {
  readonly href: Route;
  readonly words: string;
  /** What else there is to say of it. */
  readonly detail?: string;
}

/** One kind of thing that waits. */
export interface WaitingLine {
  readonly title: string;
  readonly n: number;
  readonly things: readonly WaitingThing[];
  /** Where there is a list of them, if they are not named here. */
  readonly list?: Route;
}

const nightWords = ({ date, telescope }: WaitingNight): string => `${formatDateInWords(date)}, ${telescope}`;
const counted = (n: number, one: string, many: string): string => (n === 1 ? one : many);

function line<T>(
  { n, first }: Waits<T>,
  title: string,
  thing: (item: T) => WaitingThing,
): readonly WaitingLine[] {
  return n === 0 ? [] : [{ title, n, things: first.map(thing) }];
}

const outcomeWords = ({ outcome }: WaitingSolution): string =>
  outcome === null ? 'not solved yet' : outcome === 'determined' ? 'to be proposed' : 'undetermined';

/** What waits, the most urgent kind first; nothing where nothing does. */
export function waitingLines(waiting: Waiting): readonly WaitingLine[] {
  const { openNights, refusedSets, unsolvedNights, ownDrafts, toDecide, newResults, invited, nFailedJobs } =
    waiting;
  const solution = (one: WaitingSolution, detail: string): WaitingThing => ({
    href: `/solutions/${one.solution}` as Route,
    words: `Solution ${one.number}, ${nightWords(one)}`,
    detail,
  });
  return [
    ...line(openNights, counted(openNights.n, 'Your night is open', 'Your nights are open'), (one) => ({
      href: `/nights/${one.night}` as Route,
      words: nightWords(one),
    })),
    ...line(refusedSets, counted(refusedSets.n, 'Refused upload', 'Refused uploads'), (one) => ({
      href: `/measurement-sets/${one.set}` as Route,
      words: one.name,
      detail: `${formatCount(one.nFaults)} ${counted(one.nFaults, 'fault', 'faults')}, ${nightWords(one)}`,
    })),
    ...line(toDecide, counted(toDecide.n, 'Proposal to decide', 'Proposals to decide'), (one) =>
      solution(one, one.proposedBy === null ? '' : `proposed by ${one.proposedBy}`),
    ),
    ...line(newResults, counted(newResults.n, 'New calibrated night', 'New calibrated nights'), (one) => ({
      href: `/nights/${one.night}/results?programme=${encodeURIComponent(one.programme)}` as Route,
      words: `${one.programme}, ${nightWords(one)}`,
      detail: [one.verdict, one.nStars === null ? null : `${formatCount(one.nStars)} stars`]
        .filter((part) => part !== null)
        .join(', '),
    })),
    ...line(
      unsolvedNights,
      counted(unsolvedNights.n, 'Night to be solved', 'Nights to be solved'),
      (one) => ({ href: `/nights/${one.night}/solutions` as Route, words: nightWords(one) }),
    ),
    ...line(ownDrafts, counted(ownDrafts.n, 'Draft of yours', 'Drafts of yours'), (one) =>
      solution(one, outcomeWords(one)),
    ),
    ...line(invited, 'Invited, not here yet', (one) => ({
      href: '/people' as Route,
      words: one.name,
      detail: one.email,
    })),
    ...(nFailedJobs === 0
      ? []
      : [
          {
            title: counted(nFailedJobs, 'Failed job', 'Failed jobs'),
            n: nFailedJobs,
            things: [],
            list: '/jobs?state=failed' as Route,
          },
        ]),
  ];
}
