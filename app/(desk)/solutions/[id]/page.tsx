import type { Metadata } from 'next';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { orNotFound } from '@/lib/server/http/or-not-found';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { solutionPage } from '@/lib/server/reads/solution-page';
import { SolutionHead } from './_components/solution-head';
import { SolutionView } from './_components/solution-view';

type Props = PageProps<'/solutions/[id]'>;

async function pageOf({ params }: Props) {
  const [caller, { id }] = await Promise.all([callerOrSignIn(), params]);
  return orNotFound(solutionPage(caller, id));
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { solution } = await pageOf(props);
  return { title: `Solution ${solution.number}, ${formatDateInWords(solution.night_date)}` };
}

/** One fit of a night: what it found, what speaks for it, and what people decide about it. */
export default async function SolutionDetailPage(props: Props) {
  const page = await pageOf(props);
  return (
    <>
      <SolutionHead page={page} />
      <SolutionView page={page} />
    </>
  );
}
