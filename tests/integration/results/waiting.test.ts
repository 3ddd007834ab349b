import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import type { Waiting } from '@/lib/contracts/waiting';
import { logFrames } from '@/lib/server/acts/log-frames';
import { markResultsSeen } from '@/lib/server/acts/mark-results-seen';
import { openNight } from '@/lib/server/acts/open-night';
import { execute, insert } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { programmePage } from '@/lib/server/reads/programme-page';
import { waiting } from '@/lib/server/reads/waiting';
import { newCallers, newLogWorld } from '@/tests/support/log-world';
import { newResult, newSolution } from '@/tests/support/results';

let as: (name: string) => PersonCaller;
let open: string;
let unsolved: string;
let solved: string;

async function newNight(date: string, state: 'open' | 'closed' | 'calibrated'): Promise<string> {
  const { id } = await openNight(as('observer'), { telescope: 'larkspur', date });
  const frame = { type: 'target', band: 'V', utc_start: `${date}T22:00:00Z`, exposure: 30 };
  await logFrames(
    as('observer'),
    id,
    [FrameInput.parse({ ...frame, object: 'Thistle 3', programme: 'MH26B-04' })],
    { origin: 'log', isList: true },
  );
  await execute('UPDATE nights SET state = :state WHERE public_id = :id', { state, id }, null);
  return id;
}

interface NewSet {
  readonly night: string;
  readonly state: 'matched' | 'refused';
  readonly by: PersonCaller;
  readonly nFaults?: number;
  readonly kind?: 'standard' | 'target';
}

async function newSet({ night, state, by, nFaults = 0, kind = 'standard' }: NewSet): Promise<string> {
  const publicId = newPublicId();
  await insert(
    `INSERT INTO measurement_sets
       (public_id, night_id, kind, name, state, file_name, content_type, size, sha256, tolerance, mapping, comments,
        n_rows, n_matched, n_faults, uploaded_by_id)
     SELECT :publicId, n.id, :kind, 'evening', :state, 'a.csv', 'text/csv', 1, :sha256, 3, '{}', '', 5, 5, :nFaults, :by
       FROM nights n WHERE n.public_id = :night`,
    { publicId, night, kind, state, nFaults, by: by.personId, sha256: publicId.padEnd(64, '0') },
    null,
  );
  return publicId;
}

beforeAll(async () => {
  const { thistle, marrow } = await newLogWorld();
  as = await newCallers({
    observer: { roles: ['observer'] },
    otherObserver: { roles: ['observer'] },
    photometrist: { roles: ['photometrist'] },
    secondPhotometrist: { roles: ['photometrist'] },
    manager: { roles: ['manager'] },
    thistlePi: { programmes: [[thistle, 'pi']] },
    thistleCo: { programmes: [[thistle, 'coinvestigator']] },
    marrowCo: { programmes: [[marrow, 'coinvestigator']] },
    nobody: {},
  });
  // Those above have no password either: they are in, but for one who is not.
  await execute("UPDATE people SET password_hash = 'x'", {}, null);
  await execute("UPDATE people SET password_hash = NULL WHERE name = 'nobody'", {}, null);
  open = await newNight('2026-11-05', 'open');
  unsolved = await newNight('2026-11-04', 'closed');
  solved = await newNight('2026-11-03', 'calibrated');
  await newSet({ night: unsolved, state: 'matched', by: as('observer') });
  await newSet({ night: solved, state: 'matched', by: as('observer') });
  const by = as('photometrist');
  await newSolution({ night: solved, number: 1, state: 'draft', by, outcome: 'undetermined' });
  const approved = await newSolution({
    night: solved,
    number: 2,
    state: 'approved',
    by,
    proposedBy: by,
    approvedBy: as('secondPhotometrist'),
  });
  await newSolution({ night: solved, number: 3, state: 'proposed', by, proposedBy: by });
  await newSolution({ night: solved, number: 4, state: 'draft', by, outcome: 'undetermined' });
  const result = await newResult({ solution: approved, night: solved, programme: thistle });
  await execute('UPDATE transformations SET n_stars = 1184 WHERE id = :result', { result }, null);
}, 60_000);

/** Counts that are not zero, by kind. */
async function counts(name: string): Promise<Readonly<Record<string, number>>> {
  const { nFailedJobs, ...kinds } = await waiting(as(name));
  const all = [
    ...Object.entries(kinds).map(([kind, { n }]) => [kind, n] as const),
    ['failedJobs', nFailedJobs] as const,
  ];
  return Object.fromEntries(all.filter(([, n]) => n > 0));
}
const part = async <K extends keyof Waiting>(name: string, kind: K): Promise<Waiting[K]> =>
  (await waiting(as(name)))[kind];

describe('what waits for a person', () => {
  it.each([
    ['observer', { openNights: 1 }],
    ['otherObserver', {}],
    ['photometrist', { unsolvedNights: 1, ownDrafts: 1 }],
    ['secondPhotometrist', { unsolvedNights: 1, toDecide: 1 }],
    ['manager', { invited: 1 }],
    ['thistlePi', { newResults: 1 }],
    ['thistleCo', { newResults: 1 }],
    ['marrowCo', {}],
    ['nobody', {}],
  ] as const)('of the %s is theirs alone', async (name, expected) => {
    expect(await counts(name)).toEqual(expected);
  });

  it('names the night that an observer has left open', async () => {
    expect((await part('observer', 'openNights')).first).toEqual([
      { night: open, date: '2026-11-05', telescope: 'Larkspur 0.8 m' },
    ]);
  });

  it('does not name a draft after which another was approved, and says what became of the later one', async () => {
    const { first } = await part('photometrist', 'ownDrafts');
    expect(first.map(({ number, outcome }) => [number, outcome])).toEqual([[4, 'undetermined']]);
  });

  it('asks nobody to decide on a proposal of their own', async () => {
    expect((await part('photometrist', 'toDecide')).n).toBe(0);
    expect((await part('secondPhotometrist', 'toDecide')).first[0]).toMatchObject({
      number: 3,
      proposedBy: 'photometrist',
    });
  });

  it('counts more than it names', async () => {
    for (let i = 1; i <= 101; i += 1) {
      await newSolution({ night: unsolved, number: i, state: 'draft', by: as('secondPhotometrist') });
    }
    const { n, first } = await part('secondPhotometrist', 'ownDrafts');
    await execute(
      'DELETE FROM solutions WHERE created_by_id = :id',
      { id: as('secondPhotometrist').personId },
      null,
    );
    expect([n, first.length]).toEqual([101, 100]);
  });

  it('is for the night’s observer and the uploader a table with faults, until one is taken in its place', async () => {
    const refused = await newSet({ night: open, state: 'refused', by: as('photometrist'), nFaults: 3 });
    for (const name of ['observer', 'photometrist']) {
      expect((await part(name, 'refusedSets')).first.map(({ set }) => set)).toEqual([refused]);
    }
    for (const name of ['otherObserver', 'thistlePi', 'secondPhotometrist']) {
      expect((await part(name, 'refusedSets')).n).toBe(0);
    }
    await newSet({ night: open, state: 'matched', by: as('photometrist') });
    expect((await part('observer', 'refusedSets')).n).toBe(0);
  });

  it('tells managers of failed jobs, and of nobody else’s anybody else', async () => {
    await insert(
      "INSERT INTO jobs (public_id, kind, payload, state, created_by_id, max_tries, run_after) VALUES (:id, 'tidy', '{}', 'failed', :by, 3, NOW(3))",
      { id: newPublicId(), by: as('observer').personId },
      null,
    );
    expect(await part('manager', 'nFailedJobs')).toBe(1);
    expect(await part('photometrist', 'nFailedJobs')).toBe(0);
  });
});

describe('results that a person has opened', () => {
  it('are new no longer to them, and still are to the others', async () => {
    await markResultsSeen(as('thistlePi'), { night: solved, programme: 'MH26B-04' });
    await markResultsSeen(as('thistlePi'), { night: solved, programme: 'MH26B-04' });
    expect((await part('thistlePi', 'newResults')).n).toBe(0);
    expect((await part('thistleCo', 'newResults')).first[0]).toMatchObject({
      programme: 'MH26B-04',
      nStars: 1184,
      verdict: 'photometric',
    });
  });
});

describe('a programme’s nights', () => {
  const nightsOf = async (name: string) =>
    (await programmePage(as(name), 'MH26B-04')).nights.map(({ date, verdict, stars }) => [
      date,
      verdict,
      stars,
    ]);

  it('have verdict and calibrated stars where there are any', async () => {
    expect(await nightsOf('thistlePi')).toEqual([
      ['2026-11-05', null, null],
      ['2026-11-04', null, null],
      ['2026-11-03', 'photometric', 1184],
    ]);
  });

  it('keep both from an observer who was not there', async () => {
    expect(await nightsOf('otherObserver')).toContainEqual(['2026-11-03', null, null]);
    expect(await nightsOf('observer')).toContainEqual(['2026-11-03', 'photometric', 1184]);
  });
});
