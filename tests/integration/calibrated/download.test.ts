import { createHash } from 'node:crypto';
import { beforeAll, expect, it } from 'vitest';
import { CalibratedQuery, CalibratedStar } from '@/lib/contracts/api/calibrated';
import { FrameInput } from '@/lib/contracts/api/frame';
import { calibratedColumns } from '@/lib/contracts/calibrated-columns';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute } from '@/lib/server/data/database';
import { streamOf } from '@/lib/server/http/stream-of';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { calibratedDownload } from '@/lib/server/reads/calibrated-download';
import { faultOf } from '@/tests/support/fault-of';
import { newCallers, newLogWorld } from '@/tests/support/log-world';
import { addStars, newResult, newSolution } from '@/tests/support/results';

let night: string;
let as: (name: string) => PersonCaller;
const solutions: Record<'earlier' | 'approved' | 'withdrawn', string> = {
  earlier: '',
  approved: '',
  withdrawn: '',
};

beforeAll(async () => {
  const world = await newLogWorld();
  as = await newCallers({
    observer: { roles: ['observer'] },
    photometrist: { roles: ['photometrist'] },
    manager: { roles: ['manager'] },
    otherObserver: { roles: ['observer'] },
    pi: { programmes: [[world.thistle, 'pi']] },
    coinvestigator: { programmes: [[world.marrow, 'coinvestigator']] },
    outsider: {},
  });
  const [noor, bram] = [as('observer'), as('photometrist')];
  night = (await openNight(noor, { telescope: 'larkspur', date: '2026-11-03' })).id;
  const frame = { type: 'target', band: 'V', exposure: 60 };
  for (const [object, utc_start] of [
    ['Thistle 3', '2026-11-03T22:00:00Z'],
    ['LV Marrow', '2026-11-03T22:10:00Z'],
  ])
    await logFrames(noor, night, [FrameInput.parse({ ...frame, object, utc_start })], {
      origin: 'log',
      isList: false,
    });
  const made = { night, by: bram, proposedBy: bram, approvedBy: bram };
  const earlier = await newSolution({ ...made, number: 1, state: 'superseded' });
  const approved = await newSolution({ ...made, number: 2, state: 'approved' });
  const withdrawn = await newSolution({ ...made, number: 3, state: 'withdrawn' });
  Object.assign(solutions, {
    earlier: earlier.publicId,
    approved: approved.publicId,
    withdrawn: withdrawn.publicId,
  });
  const of = (solution: typeof approved, programme: number | null) =>
    newResult({ solution, night, programme });
  await addStars(await of(earlier, world.thistle), [{ no: 1, star: 'old', v: 12 }]);
  await addStars(await of(withdrawn, world.thistle), [{ no: 1, star: 'gone', v: 12 }]);
  const own = await of(approved, world.thistle);
  await addStars(own, [
    { no: 1, star: '=cmd()', v: 12.345678, bv: -0.1, random: 0.003, flags: 1 | 256 },
    { no: 2, star: 'Quote " and, comma', v: null, bv: null },
  ]);
  await execute(
    `INSERT INTO calibrated_magnitudes (transformation_id, star_no, star, v, v_random, v_systematic)
     SELECT :own, seq, CONCAT('S ', seq), 10 + seq / 1000, 0.003, 0.004 FROM seq_3_to_4500`,
    { own },
    null,
  );
  await addStars(await of(approved, world.marrow), [{ no: 1, star: 'M 1', v: 13 }]);
  await addStars(await of(approved, null), [{ no: 1, star: 'N 1', v: 14 }]);
});

async function textOf(name: string, query: Record<string, string>): Promise<string> {
  const { text } = await calibratedDownload(as(name), night, CalibratedQuery.parse(query));
  return new Response(streamOf(text)).text();
}
const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex');

function partsOf(csv: string): { head: string[]; names: string[]; rows: string[]; body: string } {
  const lines = csv.split('\r\n');
  const at = lines.findIndex((line) => !line.startsWith('#'));
  return {
    head: lines.slice(0, at),
    names: lines[at]?.split(',') ?? [],
    rows: lines.slice(at + 1, -1),
    body: csv.slice(csv.indexOf('\r\nstar,') + 2 + (lines[at]?.length ?? 0) + 2),
  };
}
const starsOf = async (name: string, query: Record<string, string> = {}): Promise<readonly string[]> => {
  const { items } = JSON.parse(await textOf(name, query)) as { items: { star: string }[] };
  return items.map(({ star }) => star);
};

it('a CSV file begins with where it comes from, and its checksum is that of its rows', async () => {
  const { head, names, rows, body } = partsOf(await textOf('pi', { format: 'csv', programme: 'MH26B-04' }));
  for (const line of [
    '# observatory: Marrow Hill Observatory',
    '# telescope: larkspur (Larkspur 0.8 m)',
    '# night: 2026-11-03',
    '#   MH26B-04',
    `# solution: ${solutions.approved}`,
    '# solution_state: approved',
    '# verdict: photometric',
    '# approved_by: a photometrist of the observatory',
    '# standards_source: Landolt 1992',
    '# options:',
    '#   a star without B or without V is taken to have B-V 0.65 ± 0.35 mag, and is flagged',
    '#   a star is flagged where the signal-to-noise ratio of all that is used in a band is below 12',
    '#   a magnitude is flagged where the offset of a frame that it rests on is above 0.09 mag',
    `# sha256: ${sha256(body)}`,
  ])
    expect(head).toContain(line);
  expect(head.some((line) => /^# exported_at: \d{4}-.*Z$/.test(line))).toBe(true);
  expect(head.some((line) => line.includes('is flagged'))).toBe(true);
  for (const { name, meaning } of calibratedColumns)
    expect(
      head.some((line) => line.startsWith(`#   ${name}`) && line.endsWith(meaning)),
      name,
    ).toBe(true);
  expect(names).toEqual(calibratedColumns.map(({ name }) => name));
  expect(rows).toHaveLength(4500);
});

it('numbers keep their digits, totals are made of both errors, and a formula is no formula', async () => {
  const { names, rows } = partsOf(await textOf('pi', { format: 'csv' }));
  const row = Object.fromEntries((rows[0] ?? '').split(',').map((cell, at) => [names[at], cell]));
  expect(row).toMatchObject({
    star: "'=cmd()",
    ra: '83.5000000',
    n_V: '3',
    V: '12.34568',
    V_random: '0.00300',
    V_systematic: '0.00400',
    V_total: '0.00500',
    BV: '-0.10000',
    UB: '',
    UB_total: '',
    bjd_tdb: '2461348.500000',
    flags: 'colour_range;time_range',
    programme: 'MH26B-04',
    solution: solutions.approved,
    night: '2026-11-03',
  });
  expect(rows[1]?.startsWith('"Quote "" and, comma",')).toBe(true);
  expect(rows[4499]?.startsWith('S 4500,,,')).toBe(true);
});

it('a JSON file is as the interface says, and its checksum is that of its items', async () => {
  const text = await textOf('pi', {});
  const { provenance, items } = JSON.parse(text) as {
    provenance: { sha256: string; solution: string; columns: unknown[]; options: string[] };
    items: unknown[];
  };
  expect(items).toHaveLength(4500);
  expect(items.map((item) => CalibratedStar.parse(item))).toEqual(items);
  expect(items[0]).toMatchObject({ star: '=cmd()', V_total: 0.005, flags: ['colour_range', 'time_range'] });
  const begin = text.indexOf('"items":[\n') + '"items":[\n'.length;
  expect(provenance.sha256).toBe(sha256(text.slice(begin, text.lastIndexOf('\n]'))));
  expect(provenance.solution).toBe(solutions.approved);
  // Those of three programmes are the same: each is said once.
  expect(provenance.options).toHaveLength(3);
  expect(provenance.columns).toHaveLength(calibratedColumns.length);
});

it.each([
  ['manager', 4502],
  ['photometrist', 4502],
  ['observer', 4502],
  ['pi', 4500],
  ['coinvestigator', 1],
])('the %s downloads what is theirs to see: %i stars', async (name, n) => {
  const stars = await starsOf(name);
  expect(stars).toHaveLength(n);
  expect(stars.includes('M 1')).toBe(name !== 'pi');
});

it.each([
  ['otherObserver', {}],
  ['outsider', {}],
  ['coinvestigator', { programme: 'MH26B-04' }],
  ['coinvestigator', { programme: '' }],
  ['pi', { programme: 'MH26B-11' }],
  ['pi', { solution: 'nosuchsoluti' }],
] as const)('for the %s there is nothing at %o', async (name, query) => {
  const fault = await faultOf(textOf(name, query));
  expect(fault.code).toBe('not-found');
});

it('an earlier solution stays readable by its id; one that was withdrawn is not', async () => {
  expect(await starsOf('pi', { solution: solutions.earlier })).toEqual(['old']);
  expect((await faultOf(textOf('pi', { solution: solutions.withdrawn }))).code).toBe('not-found');
});

it('what is still being made is refused as such', async () => {
  await execute(
    `UPDATE transformations t JOIN programmes g ON g.id = t.programme_id JOIN solutions s ON s.id = t.solution_id
        SET t.state = 'queued' WHERE g.code = 'MH26B-11' AND s.state = 'approved'`,
    {},
    null,
  );
  expect(await faultOf(textOf('coinvestigator', {}))).toMatchObject({ code: 'conflict' });
});

it('formats that are not offered are refused by name', () => {
  const { error } = CalibratedQuery.safeParse({ format: 'votable' });
  expect(error?.issues[0]?.path).toEqual(['format']);
});
