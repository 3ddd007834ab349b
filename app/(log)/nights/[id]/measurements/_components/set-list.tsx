'use client';

import Link from 'next/link';
import type { Route } from 'next';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { formatCount } from '@/lib/contracts/format-figure';
import { formatInstant } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import { hasEnded } from '@/lib/contracts/api/job';
import type { MeasurementSet } from '@/lib/contracts/api/measurement-set';
import { SetProgress } from '@/app/_components/measurements/set-progress';

interface SetListProps {
  readonly sets: readonly MeasurementSet[];
  readonly mayUpload: boolean;
  /** A check has come to its end. */
  readonly onEnd: () => void;
}

/** Every set of the night with its state; those that are being checked say how far they are. */
export function SetList({ sets, mayUpload, onEnd }: SetListProps) {
  if (sets.length === 0) {
    return (
      <Panel title="Sets">
        <EmptyState title="No measurements yet">
          Tables of instrumental magnitudes belong here, of standards and of targets. Each is checked line by
          line and taken whole or not at all. {mayUpload ? 'Upload the first above.' : null}
        </EmptyState>
      </Panel>
    );
  }
  const count = sets.length === 1 ? 'one table' : `${sets.length} tables`;
  return (
    <Panel title="Sets" note={`${count}, the newest first`} flush>
      <DataTable caption="Measurement sets of the night" head={<Head />}>
        {sets.map((set) => (
          <SetRow key={set.id} set={set} onEnd={onEnd} />
        ))}
      </DataTable>
    </Panel>
  );
}

function Head() {
  return (
    <Row>
      <HeadCell>Set</HeadCell>
      <HeadCell>Kind</HeadCell>
      <HeadCell>State</HeadCell>
      <HeadCell numeric>Rows</HeadCell>
      <HeadCell numeric unit="rows of standards">
        Matched
      </HeadCell>
      <HeadCell numeric>Faults</HeadCell>
      <HeadCell numeric unit="into the log">
        Frames
      </HeadCell>
      <HeadCell>Uploaded</HeadCell>
    </Row>
  );
}

function SetRow({ set, onEnd }: { readonly set: MeasurementSet; readonly onEnd: () => void }) {
  const isUnfinished = set.state === 'received' || set.state === 'checked';
  const isRunning = isUnfinished && set.job !== null && !hasEnded(set.job.state);
  return (
    <>
      <Row>
        <Cell heading className="max-w-80 truncate">
          <Link href={`/measurement-sets/${set.id}` as Route}>{set.name}</Link>
        </Cell>
        <Cell>{set.kind}</Cell>
        <Cell>
          <StateTag state={set.state} />
        </Cell>
        <Cell numeric>{formatCount(set.rows)}</Cell>
        <Cell numeric>{set.kind === 'target' ? '–' : formatCount(set.matched_rows)}</Cell>
        <Cell numeric>{set.faults === 0 ? '–' : formatCount(set.faults)}</Cell>
        <Cell numeric>{set.frames_created === 0 ? '–' : formatCount(set.frames_created)}</Cell>
        <Cell>
          {formatInstant(set.uploaded_at)}
          <span className="text-ink-2"> by {set.uploaded_by}</span>
        </Cell>
      </Row>
      {isUnfinished ? (
        <tr>
          <td colSpan={8} className="border-b border-rule px-3.5 pb-3">
            {isRunning && set.job ? (
              <SetProgress set={set.id} job={set.job} onEnd={onEnd} />
            ) : (
              <p className="text-table text-ink-2">
                Its check {set.job?.state === 'cancelled' ? 'was cancelled' : 'could not be finished'}; its
                page says what to do.
              </p>
            )}
          </td>
        </tr>
      ) : null}
    </>
  );
}
