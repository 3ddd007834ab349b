import type { CreationAttributes, Transaction } from 'sequelize';
import { AuditEvent } from '../../models/audit-event';
import { Condition } from '../../models/condition';
import { Frame } from '../../models/frame';
import { Night } from '../../models/night';
import { NightObserver } from '../../models/night-observer';
import { Remark } from '../../models/remark';
import { TimeLoss } from '../../models/time-loss';
import { newPublicId } from '@/lib/server/data/public-id';
import type { DemoNight } from './demo-world';
import type { ObservedNight } from './demo-nights';
import type { DemoIds } from './demo-ids';
import { minute_ms } from './night-time';
import { conditionTimes, type DemoFrame } from './plan-frames';
import { weatherOf } from './weather';

export interface NightToLoad extends Pick<DemoNight, 'observers' | 'summary' | 'time_losses'> {
  readonly observed: ObservedNight;
  readonly remarks: readonly { readonly utc: number; readonly text: string }[];
  /** Null for the night in progress [ms since 1970]. */
  readonly closedAt: number | null;
  readonly ids: DemoIds;
}

/** Adds one night with all that belongs to it, as if its observer had written it down at the time. */
export async function loadNight(input: NightToLoad, transaction: Transaction): Promise<void> {
  const { observed, observers, summary, closedAt, ids } = input;
  const observerIds = observers.map(ids.people.byEmail);
  const [observer] = observerIds;
  if (observer === undefined) throw new Error(`The night ${observed.night.date} has no observer.`);
  const openedAt = new Date(Math.floor(observed.night.sunset / minute_ms - 50) * minute_ms);
  const night = await Night.create(
    {
      publicId: newPublicId(),
      telescopeId: ids.telescope,
      date: observed.night.date,
      startsAt: new Date(observed.night.bounds.start),
      endsAt: new Date(observed.night.bounds.end),
      state: closedAt === null ? 'open' : 'closed',
      version: closedAt === null ? 1 : 2,
      summary,
      openedById: observer,
      closedById: closedAt === null ? null : observer,
      closedAt: closedAt === null ? null : new Date(closedAt),
      createdAt: openedAt,
    },
    { transaction },
  );
  await NightObserver.bulkCreate(
    observerIds.map((personId) => ({ nightId: night.id, personId })),
    { transaction },
  );
  await Frame.bulkCreate(
    observed.frames.map((frame) => frameRow(frame, night.id, observer, ids)),
    { transaction },
  );
  await loadConditions(input, night.id, observer, transaction);
  await loadTrail(night, openedAt, transaction);
}

function frameRow(
  frame: DemoFrame,
  nightId: number,
  observer: number,
  ids: DemoIds,
): CreationAttributes<Frame> {
  const { utcStart, utcMid, exposure_s: exposure, dec, programme, ...same } = frame;
  return {
    ...same,
    publicId: newPublicId(),
    nightId,
    decl: dec,
    programmeId: programme === null ? null : (ids.programmes.get(programme) ?? null),
    utcStart: new Date(utcStart),
    utcMid: new Date(utcMid),
    exposure,
    origin: 'log',
    loggedById: observer,
    createdAt: new Date(utcStart + exposure * 1000),
  };
}

async function loadConditions(
  { observed, remarks, time_losses: losses, closedAt }: NightToLoad,
  nightId: number,
  observer: number,
  transaction: Transaction,
): Promise<void> {
  const { night, weather, seed, until } = observed;
  const skyAt = weatherOf(night, weather, seed);
  const one = (value: number): number => Number(value.toFixed(1));
  await Condition.bulkCreate(
    conditionTimes(night, until).map((utc) => {
      const sky = skyAt(utc);
      const isDark = utc > night.dusk && utc < night.dawn;
      return {
        publicId: newPublicId(),
        nightId,
        utc: new Date(utc),
        cloud: sky.cloud,
        seeing: sky.cloud < 8 ? Number(sky.seeing.toFixed(2)) : null,
        humidity: Math.round(sky.humidity),
        wind: one(sky.wind),
        windDirection: sky.windDirection,
        temperature: one(sky.temperature),
        skyBrightness: isDark && sky.cloud === 0 ? Number(weather.sky_brightness.toFixed(2)) : null,
        recordedById: observer,
        createdAt: new Date(utc),
      };
    }),
    { transaction },
  );
  await Remark.bulkCreate(
    remarks.map(({ utc, text }) => ({
      publicId: newPublicId(),
      nightId,
      utc: new Date(utc),
      text,
      writtenById: observer,
      createdAt: new Date(utc),
    })),
    { transaction },
  );
  const createdAt = new Date(closedAt ?? until);
  await TimeLoss.bulkCreate(
    losses.map((loss) => ({ ...loss, publicId: newPublicId(), nightId, recordedById: observer, createdAt })),
    { transaction },
  );
}

/** The audit trail of opening and closing, as the acts of the application leave it. */
async function loadTrail(night: Night, openedAt: Date, transaction: Transaction): Promise<void> {
  const event = {
    personId: night.openedById,
    subjectKind: 'night',
    subjectId: night.publicId,
    nightId: night.id,
  };
  const opened = {
    ...event,
    utc: openedAt,
    act: 'night.open',
    afterValues: { date: night.date, state: 'open' },
  };
  const closed = night.closedAt && {
    ...event,
    utc: night.closedAt,
    act: 'night.close',
    beforeValues: { state: 'open' },
    afterValues: { state: 'closed', summary: night.summary },
  };
  await AuditEvent.bulkCreate(closed === null ? [opened] : [opened, closed], { transaction });
}
