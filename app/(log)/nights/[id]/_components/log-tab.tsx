'use client';

import { Panel } from '@/app/_components/ui/panel';
import { ConditionsPanel } from './conditions-panel';
import { FrameTable } from './frame-table';
import { LogLine } from './log-line';
import { useNight } from './night-provider';
import { RemarksPanel } from './remarks-panel';
import { TimeLostPanel } from './time-lost-panel';
import { WaitingPanel } from './waiting-panel';

/** Frames at the left with the line that logs them; the sky, remarks and what waits at the right. */
export function LogTab() {
  const { log } = useNight();
  return (
    <div className="grid gap-5 xl:grid-cols-[minmax(0,1fr)_minmax(340px,22%)]">
      <Panel flush>
        {log.may.log ? <LogLine /> : null}
        <FrameTable />
      </Panel>
      <aside className="grid content-start gap-5 md:max-xl:grid-cols-2">
        <ConditionsPanel />
        <WaitingPanel />
        <TimeLostPanel />
        <RemarksPanel />
      </aside>
    </div>
  );
}
