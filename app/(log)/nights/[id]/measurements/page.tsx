import type { Metadata } from 'next';
import { callerOrSignIn } from '@/lib/server/identity/current-caller';
import { measurementsPage } from '@/lib/server/reads/measurements-page';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { Panel } from '@/app/_components/ui/panel';
import { MeasurementsTab } from './_components/measurements-tab';

export const metadata: Metadata = { title: 'Measurements' };

interface MeasurementsPageProps {
  readonly params: Promise<{ readonly id: string }>;
}

/** The measurement sets of a night, and where a table is uploaded. */
export default async function NightMeasurementsPage({ params }: MeasurementsPageProps) {
  const [caller, { id }] = await Promise.all([callerOrSignIn(), params]);
  const { sets, ...rest } = await measurementsPage(caller, id);
  if (sets === null) {
    return (
      <Panel title="Measurements">
        <EmptyState title="Not yours to see">
          Measurements of a night are seen by its observers, by photometrists and managers, and by the
          investigators of the programmes observed in it.
        </EmptyState>
      </Panel>
    );
  }
  return <MeasurementsTab sets={sets} {...rest} />;
}
