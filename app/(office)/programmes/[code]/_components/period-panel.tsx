'use client';

import { ActButton } from '@/app/_components/ui/act-button';
import { formatDateInWords, formatIsoDate } from '@/app/_components/ui/format-time';
import { Panel } from '@/app/_components/ui/panel';
import { endPeriodAction } from '../../actions';

interface PeriodPanelProps {
  readonly programme: string;
  readonly months: number;
  /** Day on which the latest night’s data become public; null without nights. */
  readonly until: string | null;
  readonly endedAt: string | null;
  readonly mayEnd: boolean;
}

export function PeriodPanel({ programme, months, until, endedAt, mayEnd }: PeriodPanelProps) {
  return (
    <Panel title="Proprietary period">
      {endedAt === null ? (
        <p>
          {months} months after each night
          {until === null
            ? '; it begins with the first night.'
            : `; the latest night’s ends on ${formatDateInWords(until)}.`}
        </p>
      ) : (
        <p>Ended by the principal investigator on {formatDateInWords(formatIsoDate(endedAt))}.</p>
      )}
      {mayEnd ? (
        <div className="mt-3">
          <ActButton
            action={endPeriodAction}
            values={{ programme }}
            busyLabel="Ending…"
            confirm={{
              title: 'End the proprietary period now?',
              text: 'Releases of the programme become readable to everybody at once. This cannot be undone.',
              yes: 'End it',
            }}
          >
            End it early
          </ActButton>
        </div>
      ) : null}
    </Panel>
  );
}
