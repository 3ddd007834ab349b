import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { isFault } from '@/lib/faults/fault';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { setParts } from '@/lib/contracts/set-page';
import { setPage } from '@/lib/server/reads/set-page';
import { SetAbout } from './_components/set-about';
import { SetContents } from './_components/set-contents';
import { SetHead } from './_components/set-head';
import { SetStanding } from './_components/set-standing';

type Props = PageProps<'/measurement-sets/[id]'>;

const one = (value: string | string[] | undefined): string | undefined =>
  Array.isArray(value) ? value[0] : value;

async function pageOf({ params, searchParams }: Props) {
  const [caller, { id }, query] = await Promise.all([callerOrSignIn(), params, searchParams]);
  const part = setParts.find((name) => name === one(query['part']));
  try {
    return await setPage(caller, id, { part, after: one(query['after']), reason: one(query['reason']) });
  } catch (error) {
    // Not there, or not theirs to see: an address where nothing is kept.
    if (isFault(error, 'not-found') || isFault(error, 'invalid-input')) notFound();
    throw error;
  }
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  const { set } = await pageOf(props);
  return { title: set.name };
}

/** One measurement set: its state, where it came from, what matched and what did not, its rows or its faults. */
export default async function MeasurementSetPage(props: Props) {
  const page = await pageOf(props);
  return (
    <>
      <SetHead page={page} />
      <div className="grid grid-cols-1 gap-5 lg:grid-cols-[minmax(0,1fr)_minmax(300px,24%)]">
        <div className="grid min-w-0 grid-cols-1 content-start gap-5">
          <SetStanding page={page} />
          <SetContents page={page} />
        </div>
        <SetAbout page={page} />
      </div>
    </>
  );
}
