import type { Metadata } from 'next';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Panel } from '@/app/_components/ui/panel';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { nightSolutionsPage } from '@/lib/server/reads/night-solutions-page';
import { SolutionsTab } from './_components/solutions-tab';

export const metadata: Metadata = { title: 'Solutions' };

type Props = PageProps<'/nights/[id]/solutions'>;

/** The solutions of a night, and where a solve is started. */
export default async function NightSolutionsTabPage({ params, searchParams }: Props) {
  const [caller, { id }, query] = await Promise.all([callerOrSignIn(), params, searchParams]);
  const page = await nightSolutionsPage(caller, id);
  if (page.solutions === null) {
    return (
      <Panel title="Solutions">
        <EmptyState title="Not yours to see">
          Solutions of a night are seen by its observers, by photometrists and managers, and by the
          investigators of the programmes observed in it.
        </EmptyState>
      </Panel>
    );
  }
  const from = typeof query['from'] === 'string' ? query['from'] : null;
  return <SolutionsTab night={id} page={page} solutions={page.solutions} from={from} />;
}
