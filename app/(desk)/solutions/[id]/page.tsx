import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { isFault } from '@/lib/faults/fault';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { solutionPage } from '@/lib/server/reads/solution-page';
import { SolutionHead } from './_components/solution-head';
import { SolutionView } from './_components/solution-view';

type Props = PageProps<'/solutions/[id]'>;

async function pageOf({ params }: Props) {
  const [caller, { id }] = await Promise.all([callerOrSignIn(), params]);
  try {
    return await solutionPage(caller, id);
  } catch (error) {
    // Not there, or not theirs to see: an address where nothing is kept.
    if (isFault(error, 'not-found')) notFound();
    throw error;
  }
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
