import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatFixed } from '@/lib/contracts/format-figure';
import { formatMinutes } from '@/app/_components/ui/format-time';
import type { BandCondition, BandFrame } from './band-input';
import type { NightSky } from './night-sky';

interface BandTableProps {
  readonly sky: NightSky;
  readonly frames: readonly BandFrame[];
  readonly conditions: readonly BandCondition[];
}

const hour_ms = 3_600_000;

/** Every grid point at a full or half hour apart: what the strip shows, hour by hour. */
function hourly({ utc, start, end }: NightSky): readonly number[] {
  const perStep = (end - start) / Math.max(1, utc.length - 1);
  const every = Math.max(1, Math.round(hour_ms / perStep));
  return utc.map((_, i) => i).filter((i) => i % every === 0);
}

function framesWords(frames: readonly BandFrame[]): string {
  const counts = new Map<string, number>();
  for (const { type, band } of frames) {
    const name = band === null ? type : `${type} ${band}`;
    counts.set(name, (counts.get(name) ?? 0) + 1);
  }
  return [...counts].map(([name, count]) => `${count} ${name}`).join(', ');
}

/** The night band as a table: the same Sun, Moon, airmass, frames and cloud for those who do not see the strip. */
export function BandTable({ sky, frames, conditions }: BandTableProps) {
  const rows = hourly(sky);
  return (
    <DataTable
      caption="The night, hour by hour"
      head={
        <tr>
          <HeadCell numeric unit="UTC">
            From
          </HeadCell>
          <HeadCell numeric unit="deg">
            Sun’s altitude
          </HeadCell>
          <HeadCell numeric unit="deg">
            Moon’s altitude
          </HeadCell>
          {sky.curves.map(({ name }) => (
            <HeadCell key={name} numeric unit="airmass">
              {name}
            </HeadCell>
          ))}
          <HeadCell numeric unit="eighths">
            Cloud
          </HeadCell>
          <HeadCell>Frames</HeadCell>
        </tr>
      }
    >
      {rows.map((i, position) => {
        const from = sky.utc[i] ?? sky.start;
        const next = rows[position + 1];
        const to = next === undefined ? Infinity : (sky.utc[next] ?? Infinity);
        const isWithin = ({ utc }: { readonly utc: number }) => utc >= from && utc < to;
        const cloud = conditions.filter((entry) => isWithin(entry) && entry.cloud !== null).at(-1)?.cloud;
        return (
          <Row key={i}>
            <Cell heading numeric>
              {formatMinutes(from)}
            </Cell>
            <Cell numeric>{formatFixed(sky.sunAltitude[i], 0)}</Cell>
            <Cell numeric>{formatFixed(sky.moonAltitude[i], 0)}</Cell>
            {sky.curves.map(({ name, airmass }) => (
              <Cell key={name} numeric>
                {formatFixed(airmass[i], 2)}
              </Cell>
            ))}
            <Cell numeric>{formatFixed(cloud, 0)}</Cell>
            <Cell wrap>{framesWords(frames.filter(isWithin))}</Cell>
          </Row>
        );
      })}
    </DataTable>
  );
}
