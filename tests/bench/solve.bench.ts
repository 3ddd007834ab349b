import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import { addressFromEnvironment } from '@/db/connection';
import { FrameInput } from '@/lib/contracts/api/frame';
import { QueuedSolution } from '@/lib/contracts/api/solution';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { createRandom } from '@/lib/numerics/random';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { startApplication } from '@/tests/support/server';
import { solveNight } from '@/workers/handlers/solve-night';
import type { Bench, BenchWorld } from './bench';
import { benchNight, runOf, sessionCookie, takeTable } from './bench-night';

const nStars = 20;
const nVisits = 50;
const bands = ['V', 'B'] as const;
const nObservations = nStars * nVisits * bands.length;

/** A night's standards from the queue to the solution's page with all residuals, and the work of it alone. */
export const solve: Bench = {
  name: 'solve',
  run: async (world) => {
    const { caller } = await benchNight();
    const night = await standardNight(world, caller);
    // The first loads modules and compiles, the second is measured.
    await solveHere(caller, night);
    const here = await solveHere(caller, night);
    const application = await startApplication({
      database: addressFromEnvironment(),
      dataFolder: world.folder,
    });
    try {
      const client = { baseUrl: application.baseUrl, cookie: await sessionCookie(caller) };
      await solveThere(client, night);
      const there = await solveThere(client, night);
      return [
        {
          name: `solve of ${nObservations.toLocaleString('en-GB')} observations, asked over HTTP, to its page with all residuals, against the job's own work`,
          measured: there,
          baseline: here,
          unit: 's',
          aim: null,
        },
      ];
    } finally {
      await application.stop();
    }
  },
};

/** Queues a solve and does its job in this process: how long it took [s]. */
async function solveHere(caller: PersonCaller, night: string): Promise<number> {
  const begun_ms = performance.now();
  const { solution } = await queueSolve(caller, night, SolveOptions.parse({}));
  const { outcome, observations } = await solveNight(runOf<'solve-night'>('bench-solve', { solution }));
  const seconds = (performance.now() - begun_ms) / 1000;
  if (outcome !== 'determined' || observations !== nObservations)
    throw new Error(`The solve of ${observations} observations is ${outcome}.`);
  return seconds;
}

interface Client {
  readonly baseUrl: string;
  readonly cookie: string;
}

/** Asks the application for a solve, waits for its job, and reads the page and all residuals [s]. */
async function solveThere(client: Client, night: string): Promise<number> {
  const begun_ms = performance.now();
  const asked = await call(client, `/api/v1/nights/${night}/solutions`, '{}');
  const { solution, job } = QueuedSolution.parse(await asked.json());
  for (;;) {
    const { state } = (await (await call(client, `/api/v1/jobs/${job}`)).json()) as { state: string };
    if (state === 'done') break;
    if (state !== 'queued' && state !== 'running') throw new Error(`The solve is ${state}.`);
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  const page = await call(client, `/solutions/${solution}`);
  if (!(await page.text()).includes('Coefficients')) throw new Error('The page shows no coefficients.');
  let n = 0;
  for (let after: string | null = ''; after !== null;) {
    const query = `limit=1000${after === '' ? '' : `&after=${after}`}`;
    const answer = await call(client, `/api/v1/solutions/${solution}/residuals?${query}`);
    const { items, next } = (await answer.json()) as { items: readonly unknown[]; next: string | null };
    n += items.length;
    after = next;
  }
  const seconds = (performance.now() - begun_ms) / 1000;
  if (n !== nObservations) throw new Error(`The page has ${n} observations.`);
  return seconds;
}

/** Reads, or posts a body. */
async function call({ baseUrl, cookie }: Client, address: string, body?: string): Promise<Response> {
  const answer = await fetch(baseUrl + address, {
    headers: { cookie, origin: baseUrl, 'content-type': 'application/json' },
    redirect: 'manual',
    ...(body === undefined ? {} : { method: 'POST', body }),
  });
  if (!answer.ok) throw new Error(`${address} answered ${answer.status}: ${await answer.text()}`);
  return answer;
}

interface Standard {
  readonly name: string;
  readonly v: number;
  readonly bv: number;
}

const truth = {
  V: { zeroPoint: -20.1, extinction: 0.14, colourTerm: -0.04, secondOrder: 0 },
  B: { zeroPoint: -19.8, extinction: 0.25, colourTerm: 0.09, secondOrder: -0.03 },
} as const;

/** Selected Area 98 followed from four hours before its meridian to two hours after. */
async function standardNight(world: BenchWorld, caller: PersonCaller): Promise<string> {
  const { id } = await openNight(caller, { telescope: 'larkspur', date: '2026-11-20' });
  const start = Date.UTC(2026, 10, 21, 0, 30);
  const inputs = Array.from({ length: nVisits }, (_, visit) =>
    bands.map((band, place) =>
      FrameInput.parse({
        ...{ type: 'standard', object: 'SA 98', ra: 102.95, dec: -0.3, exposure: 40, band },
        utc_start: new Date(start + (7 * visit + 2 * place) * 60_000).toISOString(),
      }),
    ),
  ).flat();
  await logFrames(caller, id, inputs, { origin: 'log', isList: true });
  const file = path.join(world.folder, 'standards.csv');
  await writeFile(file, await standardTable(id));
  await takeTable({ caller, id }, file, { kind: 'standard' });
  return id;
}

async function standardTable(night: string): Promise<string> {
  const random = createRandom(5);
  const stars = await select<Standard>(
    `SELECT name, v, bv FROM standard_stars WHERE name LIKE '98%' AND is_usable = 1 AND v > 10
      ORDER BY id LIMIT ${nStars}`,
    {},
  );
  const frames = await select<{ number: number; band: 'V' | 'B'; airmass: number }>(
    `SELECT f.number, f.band, f.airmass FROM frames f JOIN nights n ON n.id = f.night_id
      WHERE n.public_id = :night ORDER BY f.number`,
    { night },
  );
  const lines = frames.flatMap(({ number, band, airmass }) =>
    stars.map(({ name, v, bv }) => {
      const { zeroPoint, extinction, colourTerm, secondOrder } = truth[band];
      const offset = zeroPoint + extinction * airmass + colourTerm * bv + secondOrder * airmass * bv;
      const measured = v + (band === 'B' ? bv : 0) + offset + 0.008 * random.normal();
      return `${number},${name},${measured.toFixed(5)},0.005`;
    }),
  );
  return `frame,star,inst_mag,inst_err\n${lines.join('\n')}\n`;
}
