import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import { cancelJob } from '@/lib/server/acts/cancel-job';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute, selectOne } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { followJob } from '@/lib/server/reads/follow-job';
import { readJob } from '@/lib/server/reads/job';
import { readJobCounts, readJobs } from '@/lib/server/reads/jobs';
import { emptyTables } from '@/tests/support/database';
import { faultOf } from '@/tests/support/fault-of';
import { queueJob } from '@/tests/support/jobs';
import { newCaller, newLogWorld, type LogWorld } from '@/tests/support/log-world';

let world: LogWorld;
let noor: PersonCaller;
let bram: PersonCaller;
let night: { readonly id: number; readonly publicId: string };
beforeEach(async () => {
  world = await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  night = await nightOfThistle(noor);
});
afterEach(emptyTables);

/** A night with one frame, of MH26B-04. */
async function nightOfThistle(observer: PersonCaller): Promise<typeof night> {
  const { id: publicId } = await openNight(observer, { telescope: 'larkspur', date: '2026-11-03' });
  const frame = { type: 'target', object: 'Thistle 3', band: 'V', exposure: 60 };
  const input = FrameInput.parse({ ...frame, utc_start: '2026-11-03T22:00:00Z' });
  await logFrames(observer, publicId, [input], { origin: 'log', isList: false });
  const row = await selectOne<{ id: number }>('SELECT id FROM nights WHERE public_id = :publicId', {
    publicId,
  });
  if (!row) throw new Error('The night was not opened.');
  return { id: row.id, publicId };
}

const kinds = ['solve-night', 'transform-targets'] as const;
/** A job of the night that Bram queued. */
const queued = (kind: (typeof kinds)[number]): Promise<string> =>
  queueJob({ kind, payload: { solution: newPublicId(), night: night.publicId }, nightId: night.id }, bram);
const listed = async (caller: PersonCaller): Promise<readonly string[]> =>
  (await readJobs(caller, { limit: 10 })).items.map(({ id }) => id);

describe.each(kinds)('a job of the kind %s', (kind) => {
  it('is read, listed and counted by those who may see the night’s solutions, and cancelled by none of them', async () => {
    const id = await queued(kind);
    const readers = [
      await newCaller('Edda Lindqvist', { roles: ['photometrist'] }),
      noor,
      await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] }),
      await newCaller('Cora Whitlock', { programmes: [[world.thistle, 'coinvestigator']] }),
    ];
    for (const reader of readers) {
      expect(await readJob(reader, id), reader.name).toMatchObject({ id, may_cancel: false });
      expect(await listed(reader), reader.name).toEqual([id]);
      expect(await readJobCounts(reader), reader.name).toMatchObject({ queued: 1 });
      expect((await faultOf(cancelJob(reader, id))).code, reader.name).toBe('not-allowed');
    }
    expect(await readJob(bram, id)).toMatchObject({ may_cancel: true });
  });

  it('does not exist for investigators of another programme, observers of another night and strangers', async () => {
    const id = await queued(kind);
    const others = [
      await newCaller('Mira Castellane', { programmes: [[world.marrow, 'pi']] }),
      await newCaller('Otis Brandvold', { roles: ['observer'] }),
      await newCaller('Ossi'),
    ];
    for (const other of others) {
      const { signal } = new AbortController();
      expect((await faultOf(readJob(other, id))).code, other.name).toBe('not-found');
      expect((await faultOf(followJob(other, id, signal))).code, other.name).toBe('not-found');
      expect((await faultOf(cancelJob(other, id))).code, other.name).toBe('not-found');
      expect(await listed(other), other.name).toEqual([]);
      expect(await readJobCounts(other), other.name).toMatchObject({ queued: 0 });
    }
  });
});

it('a check of measurements stays with who sent them, though a photometrist sees the night’s solutions', async () => {
  const job = { kind: 'check-measurements', payload: { set: newPublicId() }, nightId: night.id } as const;
  const id = await queueJob(job, noor);
  expect((await faultOf(readJob(bram, id))).code).toBe('not-found');
  expect(await listed(bram)).toEqual([]);
});

describe('a transformation, which counts the measurements of every programme', () => {
  const result = { outcome: 'stored', programmes: 2, measurements: 300, stars: 20 };
  async function atWork(state: string): Promise<string> {
    const id = await queued('transform-targets');
    await execute(
      `UPDATE jobs SET state = :state, progress = 0.4, message = 'Transforming 300 measurements of MH26B-11',
              result = :result WHERE public_id = :id`,
      { id, state, result: state === 'done' ? JSON.stringify(result) : null },
      null,
    );
    return id;
  }

  it('tells an investigator how far it is, and nothing of the others’ measurements', async () => {
    const piet = await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] });
    expect(await readJob(piet, await atWork('running'))).toMatchObject({
      state: 'running',
      progress: 0.4,
      message: 'Transforming the night’s targets',
    });
    const done = await readJob(piet, await atWork('done'));
    expect(done).toMatchObject({ state: 'done', message: '' });
    expect(done).not.toHaveProperty('result');
  });

  it('tells the night’s observers and photometrists all', async () => {
    const edda = await newCaller('Edda Lindqvist', { roles: ['photometrist'] });
    const id = await atWork('done');
    for (const reader of [noor, edda])
      expect(await readJob(reader, id), reader.name).toMatchObject({
        result,
        message: expect.stringContaining('300') as string,
      });
  });
});
