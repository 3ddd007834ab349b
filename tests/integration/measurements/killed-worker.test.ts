import { beforeAll, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { jobNow, untilJob } from '@/tests/support/jobs';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { filesIn, mailsOf, removeOriginals, setNow, upload } from '@/tests/support/measurements';
import { startWorker } from '@/tests/support/worker';

removeOriginals();
let noor: PersonCaller;
beforeAll(async () => {
  await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
});

it('a worker that is killed while it loads a table leaves nothing of it, and the next one takes it whole', async () => {
  const night = await openNight(noor, { telescope: 'larkspur', date: '2026-05-01' });
  const frame = {
    type: 'target',
    object: 'Thistle 3',
    band: 'V',
    utc_start: '2026-05-01T22:00:00Z',
    exposure: 60,
  };
  await logFrames(noor, night.id, [FrameInput.parse(frame)], { origin: 'log', isList: false });
  const rows = Array.from({ length: 300_000 }, (_, row) => `1,star ${row},-7.125,0.0125`);
  const { set, job } = await upload(noor, night.id, `frame,star,inst_mag,inst_err\n${rows.join('\n')}\n`);

  const first = startWorker();
  await expect
    .poll(() => jobNow(job), { timeout: 20_000, interval: 20 })
    .toMatchObject({
      message: expect.stringMatching(/^(Reading|Matching|Loading).*\d/) as string,
    });
  first.process.kill('SIGKILL');
  await first.ended;
  // The server of the database notices the lost connection and rolls back what it had been given.
  await expect
    .poll(() => setNow(set), { timeout: 20_000 })
    .toMatchObject({ measurements: 0, stars: 0, nMatched: null });
  expect(await jobNow(job)).toMatchObject({ state: 'running', tries: 1 });

  await execute('UPDATE jobs SET lease_until = NOW(3) WHERE public_id = :job', { job }, null);
  startWorker();
  expect(await untilJob(job, 'done', 60_000)).toMatchObject({
    tries: 2,
    result: { state: 'matched', rows: 300_000 },
  });
  expect(await setNow(set)).toMatchObject({
    state: 'matched',
    measurements: 300_000,
    stars: 300_000,
    frames: 1,
  });
  expect(await mailsOf('measurements-waiting')).toHaveLength(1);
  expect(await filesIn('work')).toEqual([]);
}, 120_000);
