'use client';

import { useState } from 'react';
import { useStretch } from '@/app/_components/hooks/use-stretch';
import { Button } from '@/app/_components/ui/button';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatFixed } from '@/lib/contracts/format-figure';
import { formatDuration, formatMinutes } from '@/app/_components/ui/format-time';
import { KeyValues, type KeyValue } from '@/app/_components/ui/key-values';
import { Panel } from '@/app/_components/ui/panel';
import type { Condition } from '@/lib/contracts/api/condition';
import { CorrectConditionDialog } from './condition-dialog';
import { useNight } from './night-provider';
import { compassPoint } from './wind-words';

const shown = [
  ['Cloud', ({ cloud }) => (cloud === null ? null : `${cloud}/8`)],
  ['Seeing', ({ seeing }) => (seeing === null ? null : `${formatFixed(seeing, 1)}″`)],
  ['Humidity', ({ humidity }) => (humidity === null ? null : `${formatFixed(humidity, 0)} %`)],
  ['Wind', windWords],
  ['Temperature', ({ temperature }) => (temperature === null ? null : `${formatFixed(temperature, 1)} °C`)],
  [
    'Sky',
    ({ sky_brightness }) =>
      sky_brightness === null ? null : `${formatFixed(sky_brightness, 1)} mag/arcsec²`,
  ],
  ['Comment', ({ comment }) => (comment === '' ? null : comment)],
] as const satisfies readonly (readonly [string, (entry: Condition) => string | null])[];

function windWords({ wind, wind_direction }: Condition): string | null {
  if (wind === null) return null;
  const from = wind_direction === null ? '' : ` ${compassPoint(wind_direction)}`;
  return `${formatFixed(wind, 1)} m/s${from}`;
}

/** Each reading as it was last taken; with its time where that was before the last entry. */
function readings(entries: readonly Condition[]): readonly KeyValue[] {
  const [last] = entries;
  return shown.flatMap(([key, words]) => {
    const entry = entries.find((one) => words(one) !== null);
    if (entry === undefined || last === undefined || (key === 'Comment' && entry !== last)) return [];
    const isOlder = entry.utc !== last.utc;
    const value = (
      <>
        {isOlder ? <span className="text-small text-ink-2">at {formatMinutes(entry.utc)} </span> : null}
        {words(entry)}
      </>
    );
    return [{ key, value, figure: key !== 'Comment' }];
  });
}

const byTime = (a: Condition, b: Condition) => Date.parse(b.utc) - Date.parse(a.utc);

/** The last entry at a glance; all of them, or those of the selected stretch, in a table under it. */
export function ConditionsPanel() {
  const { log } = useNight();
  const [stretch] = useStretch();
  const entries = log.conditions.toSorted(byTime);
  const [last] = entries;
  const minutesLost = log.timeLosses.reduce((sum, { minutes }) => sum + minutes, 0);
  const causes = [...new Set(log.timeLosses.map(({ cause }) => cause))].join(', ');
  const lost = minutesLost === 0 ? 'none' : `${formatDuration(minutesLost)} ${causes}`;
  const chosen =
    stretch === null
      ? entries
      : entries.filter(({ utc }) => Date.parse(utc) >= stretch.from && Date.parse(utc) < stretch.to);
  return (
    <Panel title="Conditions" note={last === undefined ? undefined : `last ${formatMinutes(last.utc)}`}>
      <KeyValues items={[...readings(entries), { key: 'Time lost', value: lost, figure: minutesLost > 0 }]} />
      {last === undefined ? (
        <p className="mt-2 text-ink-2">
          No entries yet. Cloud, seeing and the rest belong here, whenever they change.
        </p>
      ) : (
        <details className="mt-2">
          <summary className="min-h-6 text-small underline">
            {stretch === null
              ? `All ${entries.length} entries`
              : `${chosen.length} entries in the selected stretch`}
          </summary>
          <EntryTable entries={chosen} />
        </details>
      )}
    </Panel>
  );
}

function EntryTable({ entries }: { readonly entries: readonly Condition[] }) {
  const { log } = useNight();
  const [corrected, setCorrected] = useState<Condition | null>(null);
  return (
    <>
      <DataTable
        caption="Conditions, the latest first"
        maxHeight="320px"
        head={
          <tr>
            <HeadCell numeric unit="UTC">
              Time
            </HeadCell>
            <HeadCell numeric unit="/8">
              Cloud
            </HeadCell>
            <HeadCell numeric unit="″">
              Seeing
            </HeadCell>
            <HeadCell numeric unit="%">
              Humidity
            </HeadCell>
            <HeadCell numeric unit="m/s">
              Wind
            </HeadCell>
            <HeadCell numeric unit="°C">
              Temp.
            </HeadCell>
            <HeadCell>Comment</HeadCell>
          </tr>
        }
      >
        {entries.map((entry) => (
          <Row key={entry.id}>
            <Cell heading numeric>
              {log.may.log ? (
                <Button look="quiet" className="px-1 font-mono" onClick={() => setCorrected(entry)}>
                  {formatMinutes(entry.utc)}
                  <span className="sr-only">: correct</span>
                </Button>
              ) : (
                formatMinutes(entry.utc)
              )}
            </Cell>
            <Cell numeric>{formatFixed(entry.cloud, 0)}</Cell>
            <Cell numeric>{formatFixed(entry.seeing, 1)}</Cell>
            <Cell numeric>{formatFixed(entry.humidity, 0)}</Cell>
            <Cell numeric>{formatFixed(entry.wind, 1)}</Cell>
            <Cell numeric>{formatFixed(entry.temperature, 1)}</Cell>
            <Cell>{entry.comment}</Cell>
          </Row>
        ))}
      </DataTable>
      {corrected === null ? null : (
        <CorrectConditionDialog entry={corrected} onClose={() => setCorrected(null)} />
      )}
    </>
  );
}
