'use client';

import { useRouter } from 'next/navigation';
import { SetProgress } from '@/app/_components/measurements/set-progress';
import { Panel } from '@/app/_components/ui/panel';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';

/** The check as it goes on; when it has ended the page shows what it came to. */
export function Checking({
  set,
  job,
}: {
  readonly set: string;
  readonly job: NonNullable<MeasurementSet['job']>;
}) {
  const router = useRouter();
  return (
    <Panel title="Being checked" note="you may leave this page; the check goes on">
      <SetProgress set={set} job={job} onEnd={() => router.refresh()} />
    </Panel>
  );
}
