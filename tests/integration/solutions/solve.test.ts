import { beforeAll, describe, expect, it } from 'vitest';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { changeExclusions } from '@/lib/server/acts/change-exclusions';
import { openNight } from '@/lib/server/acts/open-night';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { refuseMeasurements } from '@/lib/server/acts/refuse-measurements';
import { withdrawSolution } from '@/lib/server/acts/withdraw-solution';
import { select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { readSolution, solutionResiduals } from '@/lib/server/reads/solutions';
import { faultOf } from '@/tests/support/fault-of';
import { jobNow } from '@/tests/support/jobs';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { removeOriginals } from '@/tests/support/measurements';
import { expectWithin } from '@/tests/support/numbers';
import { newField, solutionNow, solvableNight, solve, solvedDraft, truth } from '@/tests/support/solutions';

removeOriginals();
let noor: PersonCaller;
let ilse: PersonCaller;
let bram: PersonCaller;
let day = 1;
const date = (): string => `2026-10-${String(day++).padStart(2, '0')}`;
const usual = SolveOptions.parse({});

beforeAll(async () => {
  await newLogWorld();
  await newField();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  ilse = await newCaller('Ilse Brandt', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
});

describe('asking for a solve', { timeout: 180_000 }, () => {
  it('writes a draft, its job and who asked, and numbers drafts of a night without gaps or doubles', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const queued = await Promise.all([1, 2, 3, 4].map(() => queueSolve(noor, night.id, usual)));
    const numbers = await Promise.all(
      queued.map(async ({ solution }) => (await solutionNow(solution)).number),
    );
    expect(numbers.sort()).toEqual([1, 2, 3, 4]);
    for (const { job, solution } of queued) {
      expect(await jobNow(job)).toMatchObject({ state: 'queued' });
      expect(await readSolution(noor, solution)).toMatchObject({
        state: 'draft',
        outcome: null,
        created_by: 'Noor Hathaway',
        job: { id: job, state: 'queued' },
        may: { solve_again: true, exclude: false, propose: false, approve: false, withdraw: false },
      });
    }
  });

  it('is for photometrists, and for the observers of the night', async () => {
    const { night } = await solvableNight(noor, { date: date(), isClosed: false });
    expect((await faultOf(queueSolve(ilse, night.id, usual))).code).toBe('not-allowed');
    expect((await queueSolve(bram, night.id, usual)).solution).toMatch(/^\w{12}$/);
  });

  it('with exclusions is for photometrists only', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const options = SolveOptions.parse({ exclusions: [{ observation: `${set}.1`, reason: 'a cosmic ray' }] });
    expect((await faultOf(queueSolve(noor, night.id, options))).code).toBe('not-allowed');
    const { solution } = await queueSolve(bram, night.id, options);
    await solve(solution);
    const { items } = await solutionResiduals(bram, solution, { limit: 1000 });
    expect(items.find(({ observation }) => observation === `${set}.1`)).toMatchObject({
      used: false,
      reason: 'a cosmic ray',
      decided_by: 'Bram Oyelaran',
    });
  });

  it('is refused for a night without a matched standard', async () => {
    const night = await openNight(noor, { telescope: 'larkspur', date: date() });
    const fault = await faultOf(queueSolve(noor, night.id, usual));
    expect(fault).toMatchObject({
      code: 'conflict',
      message: expect.stringContaining('nothing to solve') as string,
    });
  });

  it('is refused with a path for everything that makes no sense', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const options = SolveOptions.parse({
      bands: ['V', 'R'],
      terms: { V: { zero_point: 'none', extinction: { fixed: 0.15 } }, I: { drift: 'free' } },
      priors: {
        V: { extinction: { value: 0.15, error: 0.01 } },
        B: { extinction: { value: 0.2, error: 0.1 } },
      },
      nights: [night.id, 'aaaaaaaaaaaa'],
      exclusions: [
        { observation: `${set}.1`, reason: 'a first' },
        { observation: `${set}.1`, reason: 'a second' },
        { observation: `${set}.99999`, reason: 'not there' },
      ],
    });
    const fault = await faultOf(queueSolve(bram, night.id, options));
    expect(fault.code).toBe('invalid-input');
    expect(fault.issues.map(({ path }) => path)).toEqual([
      'nights.0',
      'nights.1',
      'bands.1',
      'terms.I',
      'priors.B',
      'terms.V.zero_point',
      'priors.V.extinction',
      'exclusions.1.observation',
      'exclusions.2.observation',
    ]);
  });
});

describe('a solve', { timeout: 180_000 }, () => {
  it('stores coefficients, every observation, evidence and what it was made from', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const id = await solvedDraft(noor, night.id);
    const solution = await readSolution(noor, id);
    expect(solution).toMatchObject({
      state: 'draft',
      outcome: 'determined',
      n_observations: 96,
      n_stars: 8,
      n_frames: 12,
      inputs: { sets: [{ id: set }], standards_source: 'A field of tests' },
      findings: expect.not.arrayContaining([expect.objectContaining({ weight: 'stop' })]) as unknown,
    });
    expect(solution.suggested_verdict).not.toBeNull();
    expect(solution.evidence).not.toHaveLength(0);
    expect(solution.inputs.hash).toMatch(/^[0-9a-f]{64}$/);
    for (const band of ['V', 'B'] as const) {
      const found = solution.bands[band];
      const value = (name: string): number =>
        found?.coefficients.find((each) => each.name === name)?.value ?? NaN;
      expectWithin(value('extinction'), truth[band].extinction, { absolute: 0.02, unit: 'mag per airmass' });
      expectWithin(value('colour_term'), truth[band].colourTerm, { absolute: 0.02, unit: 'mag per mag' });
      expect(found?.covariance).toHaveLength(found?.coefficients.length ?? -1);
    }
    const first = await solutionResiduals(noor, id, { limit: 60 });
    const rest = await solutionResiduals(noor, id, { limit: 60, after: first.next ?? '' });
    const all = [...first.items, ...rest.items];
    expect(rest.next).toBeNull();
    expect(all).toHaveLength(96);
    const times = all.map(({ utc_mid: utc }) => utc);
    expect(times).toEqual(times.toSorted());
    expect(all.every(({ residual }) => residual !== null && Math.abs(residual) < 0.05)).toBe(true);
  });

  it('run twice changes nothing', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const { solution } = await queueSolve(noor, night.id, usual);
    const [one, two] = await Promise.all([solve(solution, { id: 'one' }), solve(solution, { id: 'two' })]);
    const before = await readSolution(noor, solution);
    const again = await solve(solution);
    expect(two).toEqual(one);
    expect(again).toEqual(one);
    expect(await readSolution(noor, solution)).toEqual(before);
    expect(await solutionNow(solution)).toMatchObject({ observations: 96, bands: 2 });
  });

  it('of the same observations has the same hash and the same numbers', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const [one, two] = [await solvedDraft(noor, night.id), await solvedDraft(bram, night.id)];
    const [first, second] = [await readSolution(bram, one), await readSolution(bram, two)];
    expect(second.inputs.hash).toBe(first.inputs.hash);
    expect(second.bands).toEqual(first.bands);
  });

  it('that cannot determine a coefficient says so, and stores no number for it', async () => {
    const { night } = await solvableNight(noor, { date: date(), hours: [4] });
    const id = await solvedDraft(noor, night.id, { bands: ['V'] });
    const solution = await readSolution(bram, id);
    expect(solution).toMatchObject({ outcome: 'undetermined', may: { propose: false } });
    expect(solution.findings).toContainEqual(
      expect.objectContaining({ weight: 'stop', band: 'V', coefficient: 'extinction' }),
    );
    const extinction = solution.bands.V?.coefficients.find(({ name }) => name === 'extinction');
    expect(extinction).toMatchObject({ status: 'free', value: null, error: null });
    expect(solution.bands.V?.warnings).not.toHaveLength(0);
  });

  it('averages airmass over an exposure and by the formula asked for', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const young = await solvedDraft(noor, night.id);
    const secant = await solvedDraft(noor, night.id, { airmass_formula: 'secZ' });
    const airmasses = async (id: string): Promise<readonly number[]> =>
      (await solutionResiduals(noor, id, { limit: 1000 })).items.map(({ airmass }) => airmass);
    const [a, b] = [await airmasses(young), await airmasses(secant)];
    const widest = Math.max(...a.map((airmass, place) => Math.abs(airmass - (b[place] ?? NaN))));
    expect(widest).toBeGreaterThan(0.0005);
    expect(widest).toBeLessThan(0.1);
  });

  it('of a draft that was withdrawn meanwhile stores nothing', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const { solution } = await queueSolve(noor, night.id, usual);
    const result = await solve(solution, {
      progress: (_, message) => {
        if (message.startsWith('Fitting'))
          withdrawing = withdrawSolution(bram, solution, { comment: 'a mistake' });
      },
    });
    await withdrawing;
    expect(result).toMatchObject({ outcome: 'withdrawn' });
    expect(await solutionNow(solution)).toMatchObject({ state: 'withdrawn', outcome: null, observations: 0 });
  });
  let withdrawing: Promise<void> = Promise.resolve();
});

describe('changing exclusions', { timeout: 180_000 }, () => {
  it('makes a new draft with the earlier decisions and the change, and leaves the old one as it was', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const old = await solvedDraft(bram, night.id, {
      exclusions: [{ observation: `${set}.5`, reason: 'the first decision' }],
    });
    const [before, rows] = [
      await readSolution(bram, old),
      await solutionResiduals(bram, old, { limit: 1000 }),
    ];
    const changed = await changeExclusions(bram, old, {
      observations: [`${set}.7`, `${set}.8`],
      reason: 'a satellite',
      restore: false,
    });
    await solve(changed.solution);
    const next = await readSolution(bram, changed.solution);
    expect(next).toMatchObject({
      follows: old,
      number: before.number + 1,
      n_rejected: expect.any(Number) as number,
    });
    expect(next.model.options.exclusions).toEqual([
      { observation: `${set}.5`, reason: 'the first decision', restore: false },
      { observation: `${set}.7`, reason: 'a satellite', restore: false },
      { observation: `${set}.8`, reason: 'a satellite', restore: false },
    ]);
    expect(next.n_used).toBeLessThanOrEqual(before.n_used - 2);
    expect(await readSolution(bram, old)).toEqual(before);
    expect(await solutionResiduals(bram, old, { limit: 1000 })).toEqual(rows);
    const restored = await changeExclusions(bram, changed.solution, {
      observations: [`${set}.7`],
      reason: 'no satellite after all',
      restore: true,
    });
    await solve(restored.solution);
    const { items } = await solutionResiduals(bram, restored.solution, { limit: 1000 });
    expect(items.find(({ observation }) => observation === `${set}.7`)).toMatchObject({
      used: true,
      reason: 'no satellite after all',
    });
  });

  it('is refused for observers, for what is not solved, and for what is no observation of it', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const change = { observations: [`${set}.1`], reason: 'a reason', restore: false };
    const { solution: unsolved } = await queueSolve(noor, night.id, usual);
    expect((await faultOf(changeExclusions(bram, unsolved, change))).code).toBe('conflict');
    const solved = await solvedDraft(noor, night.id);
    expect((await faultOf(changeExclusions(noor, solved, change))).code).toBe('not-allowed');
    const fault = await faultOf(
      changeExclusions(bram, solved, { ...change, observations: [`${set}.1`, `${set}.4000`] }),
    );
    expect(fault).toMatchObject({ code: 'invalid-input', issues: [{ path: 'observations.1' }] });
  });
});

describe('what a draft rests on', { timeout: 180_000 }, () => {
  it('can be taken back: the draft stays readable, and says so', async () => {
    const { night, set } = await solvableNight(noor, { date: date() });
    const id = await solvedDraft(noor, night.id);
    await refuseMeasurements(noor, set, 'the wrong aperture');
    const solution = await readSolution(noor, id);
    expect(solution.findings.map(({ kind }) => kind)).toContain('set-taken-back');
    expect((await solutionResiduals(noor, id, { limit: 1000 })).items).toHaveLength(96);
  });

  it('is noted in the audit trail', async () => {
    const { night } = await solvableNight(noor, { date: date() });
    const id = await solvedDraft(noor, night.id);
    const acts = await select<{ act: string }>(
      `SELECT act FROM audit_events WHERE subject_kind = 'solution' AND subject_id = :id ORDER BY id`,
      { id },
    );
    expect(acts.map(({ act }) => act)).toEqual(['solution.queue', 'solution.solve']);
  });
});
