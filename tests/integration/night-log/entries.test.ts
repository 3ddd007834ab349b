import { beforeAll, describe, expect, it } from 'vitest';
import { ConditionInput } from '@/lib/contracts/api/condition';
import type { Night } from '@/lib/contracts/api/night';
import { addConditions } from '@/lib/server/acts/add-conditions';
import { addRemark } from '@/lib/server/acts/add-remark';
import { addTimeLoss } from '@/lib/server/acts/add-time-loss';
import { closeNight } from '@/lib/server/acts/close-night';
import { correctCondition } from '@/lib/server/acts/correct-condition';
import { correctRemark } from '@/lib/server/acts/correct-remark';
import { correctTimeLoss } from '@/lib/server/acts/correct-time-loss';
import { openNight } from '@/lib/server/acts/open-night';
import { removeCondition } from '@/lib/server/acts/remove-condition';
import { removeRemark } from '@/lib/server/acts/remove-remark';
import { removeTimeLoss } from '@/lib/server/acts/remove-time-loss';
import { select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { night as readNight } from '@/lib/server/reads/night';
import { nightConditions, nightRemarks, nightTimeLosses } from '@/lib/server/reads/night-entries';
import { faultOf } from '../../support/fault-of';
import { newCaller, newLogWorld } from '../../support/log-world';

let noor: PersonCaller;
let ilse: PersonCaller;
let night: Night;
let day = 1;

beforeAll(async () => {
  await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  ilse = await newCaller('Ilse Brandt', { roles: ['observer'] });
  await freshNight();
});
const freshNight = async (): Promise<void> => {
  night = await openNight(noor, { telescope: 'larkspur', date: `2026-11-${String(day++).padStart(2, '0')}` });
};
const at = (clock: string): string => `${night.date}T${clock}.000Z`;
const sky = (more: object = {}): ConditionInput =>
  ConditionInput.parse({ utc: at('22:00:00'), cloud: 2, ...more });
const addOne = async (more: object = {}) => {
  const [entry] = await addConditions(noor, night.id, [sky(more)], false);
  if (!entry) throw new Error('Nothing was added.');
  return entry;
};
const trail = (subjectId: string) =>
  select<{ act: string; reason: string; before: object | null; after: object | null }>(
    'SELECT act, reason, before_values AS `before`, after_values AS `after` FROM audit_events WHERE subject_id = :subjectId ORDER BY id',
    { subjectId },
  );

describe('conditions', () => {
  it('are kept as they were seen, and listed by time', async () => {
    const late = await addOne({
      seeing: 1.4,
      humidity: 38,
      wind: 4.5,
      wind_direction: 350,
      temperature: -3.5,
      sky_brightness: 21.3,
    });
    const [early] = await addConditions(noor, night.id, [sky({ utc: at('21:00:00'), cloud: 0 })], false);
    expect(late).toMatchObject({
      cloud: 2,
      seeing: 1.4,
      wind_direction: 350,
      temperature: -3.5,
      recorded_by: 'Noor Hathaway',
    });
    const { items } = await nightConditions(noor, night.id, { limit: 10 });
    expect(items).toEqual([early, late]);
    expect((await readNight(noor, night.id)).conditions).toBe(2);
  });

  it('come back page by page without loss, also at one and the same instant', async () => {
    await freshNight();
    const entries = Array.from({ length: 25 }, (_, index) => sky({ comment: `entry ${index}` }));
    await addConditions(noor, night.id, entries, true);
    const seen: string[] = [];
    let after: string | undefined;
    do {
      const page = await nightConditions(noor, night.id, { limit: 7, after });
      seen.push(...page.items.map(({ comment }) => comment));
      after = page.next ?? undefined;
    } while (after !== undefined);
    expect(seen).toEqual(entries.map(({ comment }) => comment));
  });

  it('are refused outside the night, all of a list, each by its index', async () => {
    await freshNight();
    const outside = sky({ utc: '2026-01-01T00:00:00Z' });
    const fault = await faultOf(addConditions(noor, night.id, [sky(), outside, outside], true));
    expect(fault.issues.map(({ path }) => path)).toEqual(['1.utc', '2.utc']);
    expect((await nightConditions(noor, night.id, { limit: 10 })).items).toEqual([]);
    expect((await faultOf(addConditions(noor, night.id, [outside], false))).issues[0]?.path).toBe('utc');
  });

  it('keep their earlier values in the audit trail when corrected', async () => {
    const entry = await addOne();
    const ids = { night: night.id, condition: entry.id };
    expect(await correctCondition(noor, ids, { cloud: 7, comment: 'thick' })).toMatchObject({
      cloud: 7,
      comment: 'thick',
    });
    expect((await trail(entry.id)).at(-1)).toMatchObject({
      act: 'condition.correct',
      before: { cloud: 2, comment: '' },
      after: { cloud: 7, comment: 'thick' },
    });
    expect(
      (await faultOf(correctCondition(noor, ids, { utc: '2026-01-01T00:00:00Z' }))).issues[0]?.path,
    ).toBe('utc');
    expect((await faultOf(correctCondition(noor, ids, { cloud: null, comment: '' }))).code).toBe(
      'invalid-input',
    );
  });

  it('keep all of an entry in the audit trail when it is withdrawn', async () => {
    const entry = await addOne();
    await removeCondition(noor, { night: night.id, condition: entry.id }, 'wrong night');
    expect((await trail(entry.id)).at(-1)).toMatchObject({
      act: 'condition.remove',
      reason: 'wrong night',
      before: entry,
    });
    expect(
      (await faultOf(removeCondition(noor, { night: night.id, condition: entry.id }, 'again'))).code,
    ).toBe('not-found');
  });

  it('are refused in a closed night, and to whoever does not observe it', async () => {
    await freshNight();
    const entry = await addOne();
    const ids = { night: night.id, condition: entry.id };
    expect((await faultOf(addConditions(ilse, night.id, [sky()], false))).code).toBe('not-allowed');
    expect((await faultOf(correctCondition(ilse, ids, { cloud: 1 }))).code).toBe('not-allowed');
    expect((await faultOf(removeCondition(ilse, ids, 'no reason'))).code).toBe('not-allowed');
    await closeNight(noor, night.id, {});
    expect((await faultOf(addConditions(noor, night.id, [sky()], false))).code).toBe('conflict');
    expect((await faultOf(correctCondition(noor, ids, { cloud: 1 }))).code).toBe('conflict');
    expect((await faultOf(removeCondition(noor, ids, 'no reason'))).code).toBe('conflict');
  });
});

describe('remarks', () => {
  it('can be written into a closed night, at its end when no time is given', async () => {
    await freshNight();
    await closeNight(noor, night.id, {});
    const remark = await addRemark(noor, night.id, { text: 'Dome slit stuck.', utc: at('23:00:00') });
    expect(remark).toMatchObject({
      text: 'Dome slit stuck.',
      utc: at('23:00:00'),
      written_by: 'Noor Hathaway',
    });
    // This night lies in the past of the machine's clock, or in its future: the remark lies within it all the same.
    const undated = await addRemark(noor, night.id, { text: 'Found the cause.' });
    expect(undated.utc >= night.starts_at && undated.utc < night.ends_at).toBe(true);
    expect((await nightRemarks(noor, night.id, { limit: 10 })).items).toHaveLength(2);
  });

  it('keep their earlier text in the audit trail, corrected or withdrawn', async () => {
    const remark = await addRemark(noor, night.id, { text: 'Windy.', utc: at('23:00:00') });
    const ids = { night: night.id, remark: remark.id };
    expect((await correctRemark(noor, ids, { text: 'Very windy.' })).text).toBe('Very windy.');
    await removeRemark(noor, ids, 'not our dome');
    expect((await trail(remark.id)).map(({ act, before }) => [act, before])).toEqual([
      ['remark.add', null],
      ['remark.correct', { text: 'Windy.' }],
      ['remark.remove', { ...remark, text: 'Very windy.' }],
    ]);
    expect((await faultOf(correctRemark(noor, ids, { text: 'x' }))).code).toBe('not-found');
    expect((await faultOf(removeRemark(noor, ids, 'gone'))).code).toBe('not-found');
  });

  it('are refused outside the night, and to whoever does not observe it', async () => {
    const outside = { text: 'x', utc: '2026-01-01T00:00:00Z' };
    expect((await faultOf(addRemark(noor, night.id, outside))).issues[0]?.path).toBe('utc');
    const remark = await addRemark(noor, night.id, { text: 'x' });
    const ids = { night: night.id, remark: remark.id };
    expect((await faultOf(correctRemark(noor, ids, outside))).issues[0]?.path).toBe('utc');
    expect((await faultOf(addRemark(ilse, night.id, { text: 'x' }))).code).toBe('not-allowed');
    expect((await faultOf(correctRemark(ilse, ids, { text: 'y' }))).code).toBe('not-allowed');
    expect((await faultOf(removeRemark(ilse, ids, 'just so'))).code).toBe('not-allowed');
  });
});

describe('time lost', () => {
  it('is summed on the night, corrected and withdrawn with its earlier values kept', async () => {
    await freshNight();
    const loss = await addTimeLoss(noor, night.id, { cause: 'weather', minutes: 90, comment: 'fog' });
    await addTimeLoss(noor, night.id, { cause: 'technical', minutes: 15, comment: '' });
    expect((await readNight(noor, night.id)).minutes_lost).toBe(105);
    const ids = { night: night.id, loss: loss.id };
    expect(await correctTimeLoss(noor, ids, { minutes: 60 })).toMatchObject({
      cause: 'weather',
      minutes: 60,
      comment: 'fog',
    });
    expect((await nightTimeLosses(noor, night.id)).items.map(({ minutes }) => minutes)).toEqual([60, 15]);
    await removeTimeLoss(noor, ids, 'was another night');
    expect((await trail(loss.id)).map(({ act, before }) => [act, before])).toEqual([
      ['time-loss.add', null],
      ['time-loss.correct', { minutes: 90 }],
      ['time-loss.remove', { ...loss, minutes: 60 }],
    ]);
    expect((await readNight(noor, night.id)).minutes_lost).toBe(15);
  });

  it('cannot be longer, all together, than the night, also when two record at once', async () => {
    await freshNight();
    const all = await Promise.allSettled(
      [1, 2, 3].map(() => addTimeLoss(noor, night.id, { cause: 'weather', minutes: 700, comment: '' })),
    );
    expect(all.filter(({ status }) => status === 'fulfilled')).toHaveLength(2);
    const [first] = (await nightTimeLosses(noor, night.id)).items;
    const fault = await faultOf(
      correctTimeLoss(noor, { night: night.id, loss: first?.id ?? '' }, { minutes: 900 }),
    );
    expect(fault.issues[0]).toMatchObject({ path: 'minutes', value: '900' });
  });

  it('is refused to whoever does not observe the night', async () => {
    const [first] = (await nightTimeLosses(noor, night.id)).items;
    const ids = { night: night.id, loss: first?.id ?? '' };
    expect(
      (await faultOf(addTimeLoss(ilse, night.id, { cause: 'other', minutes: 5, comment: '' }))).code,
    ).toBe('not-allowed');
    expect((await faultOf(correctTimeLoss(ilse, ids, { minutes: 5 }))).code).toBe('not-allowed');
    expect((await faultOf(removeTimeLoss(ilse, ids, 'just so'))).code).toBe('not-allowed');
    expect((await faultOf(removeTimeLoss(noor, { ...ids, loss: 'x' }, 'just so'))).code).toBe('not-found');
  });
});
