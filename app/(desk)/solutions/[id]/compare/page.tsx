import type { Metadata } from 'next';
import Link from 'next/link';
import type { Route } from 'next';
import { solutionBefore } from '@/app/_components/solutions/coefficient-change';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { PageHead } from '@/app/_components/ui/page-head';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { solutionPage } from '@/lib/server/reads/solution-page';
import { CoefficientsCompared } from './_components/coefficients-compared';
import { ObservationsCompared } from './_components/observations-compared';
import { OtherChoice } from './_components/other-choice';

export const metadata: Metadata = { title: 'Compare solutions' };

/** Two solutions of a night side by side: their coefficients, and the observations that only one of them used. */
export default async function CompareSolutionsPage({
  params,
  searchParams,
}: PageProps<'/solutions/[id]/compare'>) {
  const [caller, { id }, query] = await Promise.all([callerOrSignIn(), params, searchParams]);
  const { solution, solutions } = await orNotFound(solutionPage(caller, id));
  const others = solutions.filter((one) => one.id !== solution.id && one.outcome !== null);
  const other =
    others.find((one) => one.id === query['with']) ?? solutionBefore(solution, solutions) ?? others[0];
  return (
    <>
      <PageHead
        title={
          <>
            <Link href={`/solutions/${solution.id}` as Route} className="no-underline hover:underline">
              Solution {solution.number}
            </Link>{' '}
            compared, night of {formatDateInWords(solution.night_date)}
          </>
        }
      >
        <StateTag state={solution.state} />
      </PageHead>
      {other === undefined ? (
        <Panel>
          <EmptyState title="Nothing to compare with">
            The night has no other solution yet. Solve it again, with other options or other observations.
          </EmptyState>
        </Panel>
      ) : (
        <>
          <OtherChoice solution={solution.id} others={others} chosen={other.id} />
          <div className="grid grid-cols-1 gap-5">
            <CoefficientsCompared one={solution} other={other} />
            <ObservationsCompared key={other.id} one={solution} other={other} />
          </div>
        </>
      )}
    </>
  );
}
