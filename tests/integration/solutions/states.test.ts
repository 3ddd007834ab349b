import { beforeAll, describe, expect, it } from 'vitest';
import { approveSolution } from '@/lib/server/acts/approve-solution';
import { closeNight } from '@/lib/server/acts/close-night';
import { proposeSolution } from '@/lib/server/acts/propose-solution';
import { refuseMeasurements } from '@/lib/server/acts/refuse-measurements';
import { reopenNight } from '@/lib/server/acts/reopen-night';
import { withdrawSolution } from '@/lib/server/acts/withdraw-solution';
import { execute, select } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { readSolution } from '@/lib/server/reads/solutions';
import { solutionPage } from '@/lib/server/reads/solution-page';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { mailsOf, removeOriginals, setNow } from '@/tests/support/measurements';
import { newField, solutionNow, solvableNight, solvedDraft } from '@/tests/support/solutions';

removeOriginals();
let noor: PersonCaller;
let bram: PersonCaller;
let edda: PersonCaller;
let pi: PersonCaller;
let day = 1;
const date = (): string => `2026-09-${String(day++).padStart(2, '0')}`;
const nothing = { comment: '' };

beforeAll(async () => {
  const { thistle } = await newLogWorld();
  await newField();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  edda = await newCaller('Edda Lindqvist', { roles: ['photometrist'] });
  pi = await newCaller('Saskia Mbeki', { programmes: [[thistle, 'pi']] });
});

interface Proposed {
  readonly id: string;
  readonly night: string;
  readonly set: string;
}

async function draft(options: { readonly targets?: readonly string[] } = {}): Promise<Proposed> {
  const { night, set } = await solvableNight(noor, { date: date(), ...options });
  return { id: await solvedDraft(bram, night.id), night: night.id, set };
}

async function proposed(options: { readonly targets?: readonly string[] } = {}): Promise<Proposed> {
  const made = await draft(options);
  await proposeSolution(bram, made.id, { comment: 'please look', verdict: 'photometric' });
  return made;
}

const transformations = (id: string): Promise<readonly { state: string; programme: string | null }[]> =>
  select(
    `SELECT t.state, p.code AS programme FROM transformations t
       JOIN solutions s ON s.id = t.solution_id LEFT JOIN programmes p ON p.id = t.programme_id
      WHERE s.public_id = :id ORDER BY t.id`,
    { id },
  );
const transformJobs = (id: string): Promise<readonly object[]> =>
  select(`SELECT id FROM jobs WHERE kind = 'transform-targets' AND JSON_VALUE(payload, '$.solution') = :id`, {
    id,
  });
const actsOn = async (id: string): Promise<readonly string[]> =>
  (
    await select<{ act: string }>('SELECT act FROM audit_events WHERE subject_id = :id ORDER BY id', { id })
  ).map(({ act }) => act);

describe('proposing', { timeout: 180_000 }, () => {
  it('brings the sets into use and tells the other photometrists', async () => {
    const before = (await mailsOf('solution-proposed')).map(({ recipient }) => recipient);
    const { id, set } = await proposed();
    expect(await readSolution(edda, id)).toMatchObject({
      state: 'proposed',
      verdict: 'photometric',
      proposed: { name: 'Bram Oyelaran' },
      may: { propose: false, approve: true, withdraw: true },
    });
    expect(await setNow(set)).toMatchObject({ state: 'in use' });
    const inUse = await faultOf(refuseMeasurements(noor, set, 'too late'));
    expect(inUse).toMatchObject({ code: 'conflict', issues: [{ path: 'solution', value: id }] });
    expect(inUse.message).toContain('is in use: solution 1 (proposed) stands on it.');
    expect(inUse.message).toContain('A photometrist must withdraw it before the set can be taken back');
    const mails = (await mailsOf('solution-proposed')).map(({ recipient }) => recipient);
    expect(mails.slice(before.length)).toEqual([edda.email]);
    const fault = await faultOf(proposeSolution(edda, id, nothing));
    expect(fault).toMatchObject({
      code: 'conflict',
      message: expect.stringMatching(
        /^Solution 1 is proposed: it was proposed by Bram Oyelaran at/,
      ) as string,
    });
  });

  it('is refused for what the fit could not determine', async () => {
    const { night } = await solvableNight(noor, { date: date(), hours: [4] });
    const id = await solvedDraft(bram, night.id, { bands: ['V'] });
    const fault = await faultOf(proposeSolution(bram, id, { comment: '', verdict: 'photometric' }));
    expect(fault).toMatchObject({
      code: 'conflict',
      message: expect.stringContaining('undetermined') as string,
    });
    expect(await solutionNow(id)).toMatchObject({ state: 'draft', verdict: null });
  });

  it('is refused while the night is open, and when its measurements were taken back', async () => {
    const open = await solvableNight(noor, { date: date(), isClosed: false });
    const ofOpen = await solvedDraft(bram, open.night.id);
    expect((await faultOf(proposeSolution(bram, ofOpen, nothing))).message).toContain('is open');
    const { id, set } = await draft();
    await refuseMeasurements(noor, set, 'the wrong aperture');
    expect((await faultOf(proposeSolution(bram, id, nothing))).message).toContain('was taken back');
    expect((await faultOf(proposeSolution(noor, id, nothing))).code).toBe('not-allowed');
    expect((await faultOf(proposeSolution(pi, id, nothing))).code).toBe('not-found');
  });

  it('is refused to somebody who has not seen the present solution', async () => {
    const { id } = await draft();
    expect((await faultOf(proposeSolution(bram, id, { ...nothing, version: 1 }))).code).toBe('stale');
  });
});

describe('approving', { timeout: 180_000 }, () => {
  it('calibrates the night and queues its targets, by programme, in one job', async () => {
    const { id, night } = await proposed({ targets: ['Thistle 3', 'Thistle 3', 'LV Marrow'] });
    const { effect } = await solutionPage(edda, id);
    expect(effect).toEqual({
      isPhotometric: true,
      nMagnitudes: 3,
      nProgrammes: 2,
      nInvestigators: 1,
      supersedes: null,
    });
    await approveSolution(edda, id, { comment: 'agreed' });
    expect(await readSolution(pi, id)).toMatchObject({
      state: 'approved',
      approved: { name: 'Edda Lindqvist' },
      may: { withdraw: false, exclude: false, comment: false },
    });
    expect((await solutionNow(id)).nightState).toBe('calibrated');
    expect(await transformations(id)).toEqual([
      { state: 'queued', programme: 'MH26B-04' },
      { state: 'queued', programme: 'MH26B-11' },
    ]);
    expect(await transformJobs(id)).toHaveLength(1);
    expect(await actsOn(night)).toContain('night.calibrate');
    const [target] = await select<{ state: string }>(
      `SELECT m.state FROM measurement_sets m JOIN nights n ON n.id = m.night_id
        WHERE n.public_id = :night AND m.kind = 'target'`,
      { night },
    );
    expect(target?.state).toBe('in use');
  });

  it('is refused to the proposer, unless the observatory asks for one person only, which the audit trail says', async () => {
    const { id } = await proposed();
    expect((await readSolution(bram, id)).may).toMatchObject({
      approve: false,
      why_not_approve: expect.stringContaining('another photometrist') as string,
    });
    expect((await faultOf(approveSolution(bram, id, nothing))).code).toBe('not-allowed');
    expect(await solutionNow(id)).toMatchObject({ state: 'proposed', nightState: 'closed' });
    await execute(`UPDATE observatories SET settings = '{"secondApprover": false}'`, {}, null);
    await approveSolution(bram, id, nothing);
    await execute(`UPDATE observatories SET settings = '{}'`, {}, null);
    const [row] = await select<{ after: Record<string, unknown> }>(
      `SELECT after_values AS \`after\` FROM audit_events WHERE subject_id = :id AND act = 'solution.approve'`,
      { id },
    );
    expect(row?.after).toMatchObject({ approved_by_proposer: true, second_approver_required: false });
  });

  it('by two at once is done once, and the other is told who was first', async () => {
    const { id } = await proposed({ targets: ['Thistle 3'] });
    const carl = await newCaller('Carl Aumont', { roles: ['photometrist'] });
    const all = await Promise.allSettled([
      approveSolution(edda, id, nothing),
      approveSolution(carl, id, nothing),
    ]);
    const refused = all.filter((each) => each.status === 'rejected');
    expect(refused).toHaveLength(1);
    const winner = (await readSolution(edda, id)).approved?.name;
    expect(refused[0]?.reason).toMatchObject({
      code: 'conflict',
      message: expect.stringContaining(`it was approved by ${winner}`) as string,
    });
    expect(await transformations(id)).toHaveLength(1);
    expect(await transformJobs(id)).toHaveLength(1);
  });

  it('and withdrawing at once end in a withdrawn solution or a refusal, never in between', async () => {
    const { id } = await proposed({ targets: ['Thistle 3'] });
    const [approval, withdrawal] = await Promise.allSettled([
      approveSolution(edda, id, nothing),
      withdrawSolution(bram, id, { comment: 'a doubt' }),
    ]);
    expect(withdrawal.status).toBe('fulfilled');
    expect(await solutionNow(id)).toMatchObject({ state: 'withdrawn', nightState: 'closed' });
    const left = await transformations(id);
    expect(left.every(({ state }) => state === 'withdrawn')).toBe(true);
    expect(left).toHaveLength(approval.status === 'fulfilled' ? 1 : 0);
    const reason = approval.status === 'rejected' ? (approval.reason as Error).message : '';
    expect(reason).toMatch(/^$|it was withdrawn by Bram Oyelaran/);
  });

  it('supersedes the approved one, whose magnitudes stay and whose unmade ones never come', async () => {
    const { id: first, night } = await proposed({ targets: ['Thistle 3'] });
    await approveSolution(edda, first, nothing);
    const second = await solvedDraft(bram, night);
    await proposeSolution(bram, second, { comment: '', verdict: 'usable with care' });
    expect((await solutionPage(edda, second)).effect).toMatchObject({ supersedes: 1 });
    await approveSolution(edda, second, nothing);
    expect(await readSolution(edda, first)).toMatchObject({ state: 'superseded', superseded_by: second });
    expect(await transformations(first)).toEqual([{ state: 'withdrawn', programme: 'MH26B-04' }]);
    expect((await solutionNow(second)).nightState).toBe('calibrated');
  });

  it('of a night that is not photometric transforms nothing', async () => {
    const { id } = await draft({ targets: ['Thistle 3'] });
    await proposeSolution(bram, id, { comment: '', verdict: 'not photometric' });
    expect((await solutionPage(edda, id)).effect).toMatchObject({ isPhotometric: false, nInvestigators: 1 });
    await approveSolution(edda, id, nothing);
    expect(await transformations(id)).toEqual([]);
    expect(await transformJobs(id)).toEqual([]);
  });

  it('is refused when the night was opened again since the proposal', async () => {
    const { id, night } = await proposed();
    await reopenNight(noor, night, { reason: 'a frame was missing' });
    expect((await faultOf(approveSolution(edda, id, nothing))).message).toContain('is open');
    const seen = await readSolution(edda, id);
    expect(seen.findings.map(({ kind }) => kind)).toContain('night-reopened');
    await closeNight(noor, night, {});
    await approveSolution(edda, id, nothing);
    expect((await solutionNow(id)).nightState).toBe('calibrated');
  });
});

it('a set that a joint solution of another night uses names it to those who may see that night only', async () => {
  const otis = await newCaller('Otis Brandvold', { roles: ['observer'] });
  const ofOtis = await solvableNight(otis, { date: date() });
  const seen = date();
  const { night } = await solvableNight(noor, { date: seen });
  const id = await solvedDraft(bram, night.id, { nights: [ofOtis.night.id] });
  await proposeSolution(bram, id, { comment: '', verdict: 'photometric' });
  const named = await faultOf(refuseMeasurements(bram, ofOtis.set, 'a wrong flat'));
  expect(named.message).toContain(`solution 1 of the night of ${seen} (proposed) stands on it`);
  expect(named.issues.map(({ value }) => value)).toEqual([id]);
  const hidden = await faultOf(refuseMeasurements(otis, ofOtis.set, 'a wrong flat'));
  expect(hidden.message).toContain('a solution of another night stands on it');
  expect(hidden.issues).toEqual([]);
}, 180_000);

describe('withdrawing', { timeout: 180_000 }, () => {
  it('an approved solution closes the night, withdraws its magnitudes and frees its sets; nothing comes back', async () => {
    const { id: first, night, set } = await proposed({ targets: ['Thistle 3'] });
    await approveSolution(edda, first, nothing);
    const second = await solvedDraft(bram, night);
    await proposeSolution(bram, second, { comment: '', verdict: 'photometric' });
    await approveSolution(edda, second, nothing);
    await withdrawSolution(bram, second, { comment: 'a wrong filter' });
    expect(await solutionNow(second)).toMatchObject({ state: 'withdrawn', nightState: 'closed' });
    expect(await solutionNow(first)).toMatchObject({ state: 'superseded' });
    // The superseded one still holds it: its magnitudes can be read.
    expect(await setNow(set)).toMatchObject({ state: 'in use' });
    expect((await faultOf(refuseMeasurements(noor, set, 'too soon'))).message).toContain(
      'solution 1 (superseded) stands on it',
    );
    await withdrawSolution(edda, first, { comment: 'the same filter' });
    expect(await setNow(set)).toMatchObject({ state: 'matched' });
    await refuseMeasurements(noor, set, 'measured with the wrong filter');
    expect(await readSolution(bram, second)).toMatchObject({
      withdrawn: { name: 'Bram Oyelaran' },
      may: { withdraw: false },
    });
    const fault = await faultOf(withdrawSolution(bram, second, { comment: 'once more' }));
    expect(fault.message).toContain('it was withdrawn by Bram Oyelaran');
  });

  it('is for photometrists', async () => {
    const { id } = await draft();
    expect((await faultOf(withdrawSolution(noor, id, { comment: 'not mine' }))).code).toBe('not-allowed');
    expect((await faultOf(withdrawSolution(pi, id, { comment: 'not mine' }))).code).toBe('not-found');
  });
});

it('opening a calibrated night again withdraws nothing and marks its solution', async () => {
  const { id, night } = await proposed({ targets: ['Thistle 3'] });
  await approveSolution(edda, id, nothing);
  await reopenNight(noor, night, { reason: 'an exposure time was wrong' });
  const solution = await readSolution(pi, id);
  expect(solution).toMatchObject({ state: 'approved' });
  expect(solution.findings.map(({ kind }) => kind)).toContain('night-reopened');
  expect(await transformations(id)).toEqual([{ state: 'queued', programme: 'MH26B-04' }]);
}, 180_000);
