import type { Metadata } from 'next';
import { calibratedPageQuery } from '@/lib/contracts/calibrated-page';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { calibratedPage } from '@/lib/server/reads/calibrated-page';
import { MarkSeen } from './_components/mark-seen';
import { NoResult } from './_components/no-result';
import { ResultsView } from './_components/results-view';

export const metadata: Metadata = { title: 'Results' };

/** Calibrated magnitudes of a night, programme by programme. */
export default async function ResultsPage({ params, searchParams }: PageProps<'/nights/[id]/results'>) {
  const [caller, { id }, values] = await Promise.all([callerOrSignIn(), params, searchParams]);
  const query = calibratedPageQuery(values);
  const page = await orNotFound(calibratedPage(caller, id, query));
  if ('why' in page.result) return <NoResult page={page} reason={page.result} />;
  return (
    <>
      {page.programme === null ? null : <MarkSeen night={id} programme={page.programme} />}
      <ResultsView page={page} result={page.result} query={query} />
    </>
  );
}
