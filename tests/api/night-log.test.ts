import { randomUUID } from 'node:crypto';
import type { Response } from 'supertest';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  addConditions,
  correctCondition,
  listConditions,
  removeCondition,
} from '@/lib/contracts/api/condition';
import {
  correctFrame,
  getFrame,
  getNextFrame,
  listFrames,
  logFrames,
  removeFrame,
  type Frame,
} from '@/lib/contracts/api/frame';
import { getNight, listNights, openNight, patchNight, type Night } from '@/lib/contracts/api/night';
import { listObjects } from '@/lib/contracts/api/object-name';
import type { Problem } from '@/lib/contracts/api/problem';
import { addRemark, correctRemark, listRemarks, removeRemark } from '@/lib/contracts/api/remark';
import { addTimeLoss, correctTimeLoss, listTimeLosses, removeTimeLoss } from '@/lib/contracts/api/time-loss';
import type { z } from 'zod';
import { callApi, demoToken, type ApiCall } from '../support/api';

let observer: string;
let photometrist: string;
let pi: string;
let coinvestigator: string;
/** Far from the demo's nights. */
let day = Date.UTC(2031, 2, 1);

beforeAll(async () => {
  observer = await demoToken('observer');
  photometrist = await demoToken('photometrist');
  pi = await demoToken('pi');
  coinvestigator = await demoToken('coinvestigator');
});

const bodyOf = <T>(answer: Response): T => answer.body as T;
const errorsOf = (answer: Response) =>
  bodyOf<z.infer<typeof Problem>>(answer).errors.map(({ path, message }) => `${path} ${message}`);

async function freshNight(): Promise<Night> {
  day += 86_400_000;
  const date = new Date(day).toISOString().slice(0, 10);
  return bodyOf<Night>(await callApi(openNight, { token: observer, body: { telescope: 'larkspur', date } }));
}
const inNight = (night: Night, more: ApiCall = {}): ApiCall => ({
  token: observer,
  ...more,
  params: { id: night.id, ...more.params },
});
const frame = (night: Night, more: object = {}): object => ({
  type: 'target',
  object: 'Thistle 3',
  band: 'V',
  utc_start: `${night.date}T23:00:00Z`,
  exposure: 60,
  ...more,
});

describe('nights over HTTP', () => {
  it('open once, are found, closed, opened again with a reason, and listed', async () => {
    const night = await freshNight();
    const again = await callApi(openNight, {
      token: photometrist,
      body: { telescope: 'larkspur', date: night.date },
    });
    expect(again.status).toBe(409);
    expect(bodyOf<{ errors: readonly { value: string }[] }>(again).errors[0]?.value).toBe(night.id);
    expect((await callApi(getNight, inNight(night))).body).toEqual(night);
    const closed = await callApi(
      patchNight,
      inNight(night, { body: { state: 'closed', summary: 'Clear.' } }),
    );
    expect(closed.body).toMatchObject({ state: 'closed', summary: 'Clear.' });
    const noReason = await callApi(patchNight, inNight(night, { body: { state: 'open' } }));
    expect(errorsOf(noReason)).toEqual(['reason is needed to open a night again']);
    const open = await callApi(
      patchNight,
      inNight(night, { body: { state: 'open', reason: 'a flat was forgotten' } }),
    );
    expect(open.body).toMatchObject({ state: 'open', reopened_reason: 'a flat was forgotten' });
    const listed = await callApi(listNights, {
      token: observer,
      query: { from: night.date, to: night.date, telescope: 'larkspur', state: 'open' },
    });
    expect(bodyOf<{ items: readonly Night[] }>(listed).items).toEqual([open.body]);
  });

  it('are closed by one of two at once; the other gets a conflict that names the first', async () => {
    const night = await freshNight();
    const both = await Promise.all(
      [observer, photometrist].map((token) =>
        callApi(patchNight, inNight(night, { token, body: { state: 'closed' } })),
      ),
    );
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409]);
    const lost = both.find(({ status }) => status === 409);
    expect(bodyOf<{ detail: string }>(lost as Response).detail).toMatch(
      /closed by (Noor Hathaway|Bram Oyelaran) at .* UTC/,
    );
  });

  it.each([
    ['calibrated, which only an approval brings', { state: 'calibrated' }, 'state'],
    ['nothing', {}, ''],
    ['a misspelt name', { sumary: 'x' }, 'sumary'],
    ['a state and observers together', { state: 'closed', observers: ['3kq8v7m2t0xc'] }, 'observers'],
  ])('refuse to become %s', async (_, body, path) => {
    const night = await freshNight();
    const answer = await callApi(patchNight, inNight(night, { body }));
    expect(answer.status).toBe(400);
    expect(
      bodyOf<{ errors: readonly { path: string }[] }>(answer).errors.map((error) => error.path),
    ).toContain(path);
  });

  it('refuse who has not seen the present version with 412', async () => {
    const night = await freshNight();
    await callApi(patchNight, inNight(night, { body: { summary: 'Dew.' } }));
    expect(
      (await callApi(patchNight, inNight(night, { body: { summary: 'Dry.', version: 1 } }))).status,
    ).toBe(412);
  });
});

describe('frames over HTTP', () => {
  it('are logged one by one, corrected, and withdrawn', async () => {
    const night = await freshNight();
    const logged = bodyOf<Frame>(await callApi(logFrames, inNight(night, { body: frame(night) })));
    expect(logged).toMatchObject({
      number: 1,
      programme: 'MH26B-04',
      origin: 'api',
      logged_by: 'Noor Hathaway',
    });
    const at = { params: { frame: logged.id } };
    expect((await callApi(getFrame, inNight(night, at))).body).toEqual(logged);
    const corrected = await callApi(
      correctFrame,
      inNight(night, { ...at, body: { exposure: 90, version: 1 } }),
    );
    expect(corrected.body).toMatchObject({
      exposure: 90,
      version: 2,
      utc_mid: `${night.date}T23:00:45.000Z`,
    });
    const stale = await callApi(correctFrame, inNight(night, { ...at, body: { exposure: 30, version: 1 } }));
    expect(stale.status).toBe(412);
    expect(errorsOf(stale)).toEqual(['exposure is the present value', 'version is the present version']);
    expect((await callApi(getNextFrame, inNight(night))).body).toMatchObject({
      number: 2,
      object: 'Thistle 3',
      band: 'V',
    });
    expect((await callApi(removeFrame, inNight(night, at))).status).toBe(400);
    expect(
      (await callApi(removeFrame, inNight(night, { ...at, query: { reason: 'logged twice' } }))).status,
    ).toBe(204);
    expect((await callApi(getFrame, inNight(night, at))).status).toBe(404);
  });

  it('come back whole and in order, 2,500 of them by cursor', async () => {
    const night = await freshNight();
    const start = Date.parse(`${night.date}T20:00:00Z`);
    const body = Array.from({ length: 2500 }, (_, index) =>
      frame(night, { utc_start: new Date(start + index * 10_000).toISOString(), exposure: 5 }),
    );
    const logged = bodyOf<{ items: readonly Frame[]; next: null }>(
      await callApi(logFrames, inNight(night, { body })),
    );
    expect(logged.items).toHaveLength(2500);
    const seen: Frame[] = [];
    let next: string | null = '';
    while (next !== null) {
      const query = { limit: 1000, ...(next === '' ? {} : { after: next }) };
      const page: Response = await callApi(listFrames, inNight(night, { query }));
      seen.push(...bodyOf<{ items: readonly Frame[] }>(page).items);
      next = bodyOf<{ next: string | null }>(page).next;
    }
    expect(seen).toEqual(logged.items);
    expect((await callApi(listFrames, inNight(night, { query: { limit: 1001 } }))).status).toBe(400);
    expect((await callApi(listFrames, inNight(night, { query: { after: 'made up' } }))).status).toBe(400);
  });

  it('are all refused with every fault of all of them, or taken whole', async () => {
    const night = await freshNight();
    const answer = await callApi(
      logFrames,
      inNight(night, {
        body: [
          frame(night),
          frame(night, { band: 'Q' }),
          frame(night, { exposure: undefined, ra: 400, dec: 1 }),
        ],
      }),
    );
    expect(answer.status).toBe(400);
    expect(errorsOf(answer)).toEqual([
      '1.band must be one of U, B, V, R, I',
      '2.ra must be below 360 deg',
      '2.exposure is needed',
    ]);
    const outside = await callApi(
      logFrames,
      inNight(night, { body: frame(night, { utc_start: '2026-01-01T00:00:00Z' }) }),
    );
    expect(errorsOf(outside)).toEqual([
      `utc_start lies outside the night, which runs from ${night.starts_at} to ${night.ends_at}`,
    ]);
    expect(bodyOf<{ items: readonly Frame[] }>(await callApi(listFrames, inNight(night))).items).toEqual([]);
  });

  it('are refused when there are too many, when the body is too large, and when it is no JSON', async () => {
    const night = await freshNight();
    const many = await callApi(
      logFrames,
      inNight(night, { body: Array.from({ length: 5001 }, () => frame(night)) }),
    );
    expect(errorsOf(many)).toEqual([' must hold at most 5,000 frames']);
    const large = await callApi(logFrames, inNight(night, { body: `["${'x'.repeat(9 * 1024 * 1024)}"]` }));
    expect(large.status).toBe(413);
    const torn = await callApi(logFrames, inNight(night, { body: '[{"type":' }));
    expect(torn.status).toBe(400);
    expect(bodyOf<{ detail: string }>(torn).detail).toContain('not JSON');
  });

  it('are refused by a closed night with what to do', async () => {
    const night = await freshNight();
    await callApi(patchNight, inNight(night, { body: { state: 'closed' } }));
    const answer = await callApi(logFrames, inNight(night, { body: frame(night) }));
    expect(answer.status).toBe(409);
    expect(bodyOf<{ detail: string }>(answer).detail).toContain('Open it again, with a reason');
  });
});

describe('a write that is sent again', () => {
  it('with the same Idempotency-Key is done once and answered alike', async () => {
    const night = await freshNight();
    const sent = inNight(night, { body: frame(night), headers: { 'idempotency-key': randomUUID() } });
    const first = await callApi(logFrames, sent);
    const second = await callApi(logFrames, sent);
    expect(second.body).toEqual(first.body);
    expect(second.headers['idempotent-replay']).toBe('true');
    expect(bodyOf<{ items: readonly Frame[] }>(await callApi(listFrames, inNight(night))).items).toHaveLength(
      1,
    );
    const other = await callApi(logFrames, { ...sent, body: frame(night, { exposure: 61 }) });
    expect(other.status).toBe(422);
  });

  it('while the first is still running is told to wait, or gets its answer, and never done twice', async () => {
    const night = await freshNight();
    const sent = inNight(night, {
      body: Array.from({ length: 1000 }, () => frame(night)),
      headers: { 'idempotency-key': randomUUID() },
    });
    const all = await Promise.all([
      callApi(logFrames, sent),
      callApi(logFrames, sent),
      callApi(logFrames, sent),
    ]);
    expect(all.map(({ status }) => status).filter((status) => status !== 201 && status !== 409)).toEqual([]);
    expect(all.filter(({ status }) => status === 201).length).toBeGreaterThan(0);
    expect((await callApi(getNight, inNight(night))).body).toMatchObject({ frames: 1000 });
  });

  it('after a refusal may be mended under the same key', async () => {
    const night = await freshNight();
    const headers = { 'idempotency-key': randomUUID() };
    expect(
      (await callApi(logFrames, inNight(night, { headers, body: frame(night, { band: null }) }))).status,
    ).toBe(400);
    expect((await callApi(logFrames, inNight(night, { headers, body: frame(night) }))).status).toBe(201);
  });
});

describe('conditions, remarks and time lost over HTTP', () => {
  it('are added, corrected and withdrawn', async () => {
    const night = await freshNight();
    const utc = `${night.date}T22:00:00Z`;
    const many = await callApi(
      addConditions,
      inNight(night, {
        body: [
          { utc, cloud: 1 },
          { utc, comment: 'haze' },
        ],
      }),
    );
    expect(bodyOf<{ items: readonly object[] }>(many).items).toHaveLength(2);
    const one = bodyOf<{ id: string }>(
      await callApi(addConditions, inNight(night, { body: { utc, seeing: 1.2 } })),
    );
    const condition = { params: { condition: one.id } };
    expect(
      (await callApi(correctCondition, inNight(night, { ...condition, body: { seeing: 1.3 } }))).body,
    ).toMatchObject({ seeing: 1.3 });
    expect(
      (await callApi(removeCondition, inNight(night, { ...condition, query: { reason: 'wrong dome' } })))
        .status,
    ).toBe(204);
    expect(
      bodyOf<{ items: readonly object[] }>(await callApi(listConditions, inNight(night))).items,
    ).toHaveLength(2);
    expect(errorsOf(await callApi(addConditions, inNight(night, { body: { utc } })))).toEqual([
      ' An entry needs at least one reading or a comment.',
    ]);

    const remark = bodyOf<{ id: string }>(
      await callApi(addRemark, inNight(night, { body: { text: 'Dew.' } })),
    );
    const at = { params: { remark: remark.id } };
    expect(
      (await callApi(correctRemark, inNight(night, { ...at, body: { text: 'Much dew.' } }))).body,
    ).toMatchObject({ text: 'Much dew.' });
    expect(
      bodyOf<{ items: readonly object[] }>(await callApi(listRemarks, inNight(night))).items,
    ).toHaveLength(1);
    expect((await callApi(removeRemark, inNight(night, { ...at, query: { reason: 'not so' } }))).status).toBe(
      204,
    );

    const loss = bodyOf<{ id: string }>(
      await callApi(addTimeLoss, inNight(night, { body: { cause: 'weather', minutes: 30 } })),
    );
    const lost = { params: { loss: loss.id } };
    expect(
      (await callApi(correctTimeLoss, inNight(night, { ...lost, body: { minutes: 45 } }))).body,
    ).toMatchObject({ minutes: 45 });
    expect((await callApi(listTimeLosses, inNight(night))).body).toMatchObject({
      items: [{ minutes: 45 }],
      next: null,
    });
    expect(
      (await callApi(removeTimeLoss, inNight(night, { ...lost, query: { reason: 'not so' } }))).status,
    ).toBe(204);
  });
});

describe('the boundary of programmes over HTTP', () => {
  it('shows investigators their own frames and common calibration, and hides the rest as if it were not there', async () => {
    const night = await freshNight();
    const body = [
      frame(night),
      frame(night, { object: 'LV Marrow', programme: 'MH26B-11' }),
      frame(night, { type: 'bias', object: '', band: null, exposure: 0 }),
      frame(night, { type: 'focus' }),
    ];
    const { items } = bodyOf<{ items: readonly Frame[] }>(await callApi(logFrames, inNight(night, { body })));
    const seenBy = async (token: string): Promise<readonly number[]> =>
      bodyOf<{ items: readonly Frame[] }>(await callApi(listFrames, inNight(night, { token }))).items.map(
        ({ number }) => number,
      );
    // The PI has both programmes; the co-investigator the variable only.
    expect(await seenBy(pi)).toEqual([1, 2, 3]);
    expect(await seenBy(coinvestigator)).toEqual([2, 3]);
    const hidden = { token: coinvestigator, params: { frame: items[0]?.id ?? '' } };
    expect((await callApi(getFrame, inNight(night, hidden))).status).toBe(404);
    const empty = await freshNight();
    expect((await callApi(getNight, inNight(empty, { token: pi }))).status).toBe(404);
    expect((await callApi(logFrames, inNight(night, { token: pi, body: frame(night) }))).status).toBe(403);
    expect(
      (await callApi(openNight, { token: pi, body: { telescope: 'larkspur', date: '2031-12-01' } })).status,
    ).toBe(403);
  });

  it('completes names of one’s own programmes only', async () => {
    const namesFor = async (token: string): Promise<readonly string[]> =>
      bodyOf<{ items: readonly { name: string; kind: string }[] }>(await callApi(listObjects, { token }))
        .items.filter(({ kind }) => kind === 'target')
        .map(({ name }) => name);
    expect(await namesFor(observer)).toEqual(expect.arrayContaining(['Thistle 3', 'LV Marrow', 'Gorse 2']));
    expect(await namesFor(coinvestigator)).not.toContain('Thistle 3');
    const some = await callApi(listObjects, { token: observer, query: { q: 'sa 9', limit: 3 } });
    expect(bodyOf<{ items: readonly { name: string }[] }>(some).items.map(({ name }) => name)).toEqual([
      'SA 92',
      'SA 93',
      'SA 94',
    ]);
  });
});
