import Link from 'next/link';
import type { Route } from 'next';
import { PageHead } from '@/app/_components/ui/page-head';
import { StateTag } from '@/app/_components/ui/state-tag';
import { formatDateInWords, formatInstant } from '@/app/_components/ui/format-time';
import { summaryWords } from '@/app/_components/solutions/solution-words';
import { VerdictTag } from '@/app/_components/solutions/verdict-tag';
import type { Solution } from '@/lib/contracts/api/solution';
import type { SolutionPage } from '@/lib/contracts/solution-page';
import { SolutionActions } from './solution-actions';

/** Which solution this is, how it stands, and what one can do with it. */
export function SolutionHead({ page }: { readonly page: SolutionPage }) {
  const { solution, telescopeName } = page;
  const later = page.solutions.find(({ id }) => id === solution.superseded_by);
  return (
    <>
      <PageHead
        title={
          <>
            Solution {solution.number}, night of{' '}
            <Link
              href={`/nights/${solution.night}/solutions` as Route}
              className="no-underline hover:underline"
            >
              {formatDateInWords(solution.night_date)}
            </Link>
          </>
        }
        actions={<SolutionActions page={page} />}
      >
        <StateTag state={solution.state} />
        <VerdictTag solution={solution} />
        <span className="text-ink-2">
          {telescopeName}. {summaryWords(solution)}
        </span>
      </PageHead>
      {courseOf(solution).length === 0 && later === undefined ? null : (
        <p className="mb-3 text-ink-2">
          {courseOf(solution).join(' ')}{' '}
          {later === undefined ? null : (
            <>
              Superseded by <Link href={`/solutions/${later.id}` as Route}>solution {later.number}</Link>.
            </>
          )}
        </p>
      )}
    </>
  );
}

function courseOf({ proposed, approved, withdrawn }: Solution): readonly string[] {
  const steps = [
    ['Proposed', proposed],
    ['Approved', approved],
    ['Withdrawn', withdrawn],
  ] as const;
  return steps.flatMap(([word, who]) =>
    who === null ? [] : [`${word} by ${who.name}, ${formatInstant(who.at)}.`],
  );
}
