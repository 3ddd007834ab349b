import { beforeAll, beforeEach, expect, it } from 'vitest';
import { approveSolution } from '@/lib/server/acts/approve-solution';
import { proposeSolution } from '@/lib/server/acts/propose-solution';
import { execute, select, selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller, newLogWorld, type LogWorld } from '@/tests/support/log-world';
import { mailsOf, removeOriginals } from '@/tests/support/measurements';
import { newField, solvableNight, solvedDraft } from '@/tests/support/solutions';

removeOriginals();
let world: LogWorld;
let noor: PersonCaller;
let bram: PersonCaller;
let edda: PersonCaller;
let piet: PersonCaller;
let mira: PersonCaller;
let day = 1;
const kind = 'night-not-photometric';

beforeAll(async () => {
  world = await newLogWorld();
  await newField();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
  bram = await newCaller('Bram Oyelaran', { roles: ['photometrist'] });
  edda = await newCaller('Edda Lindqvist', { roles: ['photometrist'] });
  piet = await newCaller('Piet Sandoval', { programmes: [[world.thistle, 'pi']] });
  mira = await newCaller('Mira Castellane', {
    programmes: [
      [world.thistle, 'coinvestigator'],
      [world.marrow, 'pi'],
    ],
  });
  const gone = await newCaller('Ossi Karlgren', { programmes: [[world.marrow, 'coinvestigator']] });
  await execute('UPDATE people SET disabled_at = NOW(3) WHERE id = :id', { id: gone.personId }, null);
}, 120_000);
beforeEach(async () => {
  await execute('DELETE FROM mails', {}, null);
});

interface Judged {
  readonly solution: string;
  readonly night: string;
  readonly date: string;
}

/** A solved night that waits for approval with this verdict; its targets are measured. */
async function judged(verdict: 'photometric' | 'not photometric', ...targets: string[]): Promise<Judged> {
  const date = `2026-09-${String(day++).padStart(2, '0')}`;
  const { night } = await solvableNight(noor, { date, targets });
  const solution = await solvedDraft(bram, night.id);
  await proposeSolution(bram, solution, { comment: 'Cirrus from 23 h.', verdict });
  return { solution, night: night.id, date };
}

const approve = (solution: string, comment = ''): Promise<void> =>
  approveSolution(edda, solution, { comment });
const recipients = async (): Promise<readonly string[]> =>
  (await mailsOf(kind)).map(({ recipient }) => recipient);
/** Its text in one line, wherever the letter breaks it. */
const letterTo = async (person: PersonCaller): Promise<string> => {
  const mail = await selectOne<{ text: string }>(
    'SELECT text FROM mails WHERE kind = :kind AND person_id = :id',
    { kind, id: person.personId },
  );
  return (mail?.text ?? '').replaceAll(/\s+/g, ' ');
};

it('each investigator of a programme with targets in the night gets one mail at the approval, and nobody else', async () => {
  const { solution } = await judged('not photometric', 'Thistle 3', 'LV Marrow', 'Thistle 3');
  expect(await recipients()).toEqual([]);
  await approve(solution);
  expect(await recipients()).toEqual([piet.email, mira.email]);
  expect(await letterTo(piet)).toContain('Programme MH26B-04 ');
  expect(await letterTo(piet)).not.toContain('MH26B-11');
  expect(await letterTo(mira)).toContain('Programmes MH26B-04, MH26B-11 ');
  const jobs = await select<{ state: string }>(
    `SELECT j.state FROM jobs j JOIN mails m ON JSON_VALUE(j.payload, '$.mail') = m.public_id WHERE m.kind = :kind`,
    { kind },
  );
  expect(jobs).toHaveLength(2);
});

it('the mail says who judged, why, what the fit found, and where to look', async () => {
  const { solution, night } = await judged('not photometric', 'Thistle 3');
  await execute(
    `UPDATE solutions SET evidence = :evidence WHERE public_id = :solution`,
    {
      solution,
      evidence: JSON.stringify([
        { speaks: 'for', kind: 'scatter', band: null, words: 'Scatter 0.012 mag in V: within 0.02.' },
        { speaks: 'care', kind: 'drift', band: 'V', words: 'The zero point in V drifts.' },
        { speaks: 'against', kind: 'scatter', band: 'B', words: 'Scatter 0.080 mag in B: above 0.05.' },
      ]),
    },
    null,
  );
  await approve(solution, 'I agree, all sky was covered.');
  const text = await letterTo(piet);
  for (const part of [
    'judged not photometric',
    'no magnitudes on the standard system',
    'number 1 of the night',
    'Proposed by Bram Oyelaran: “Cirrus from 23 h.”',
    'Approved by Edda Lindqvist: “I agree, all sky was covered.”',
    'Scatter 0.080 mag in B: above 0.05.',
    `http://evenfall.example/solutions/${solution}`,
    `http://evenfall.example/nights/${night}/measurements`,
  ])
    expect(text, part).toContain(part);
  expect(text).not.toContain('within 0.02');
  expect(text).not.toContain('drifts');
  expect(text).not.toContain('earlier solution');
});

it('magnitudes of an earlier solution are said to stay', async () => {
  const { solution: first, night } = await judged('photometric', 'Thistle 3');
  await approve(first);
  expect(await recipients()).toEqual([]);
  // As its job leaves it.
  await execute(
    `UPDATE transformations t JOIN solutions s ON s.id = t.solution_id SET t.state = 'done'
      WHERE s.public_id = :first`,
    { first },
    null,
  );
  const second = await solvedDraft(bram, night);
  await proposeSolution(bram, second, { comment: '', verdict: 'not photometric' });
  await approve(second);
  expect(await letterTo(piet)).toContain('made with an earlier solution are superseded');
});

it('an approval that is undone or refused sends nothing, and a second one nothing anew', async () => {
  const { solution } = await judged('not photometric', 'Thistle 3');
  expect((await faultOf(approveSolution(bram, solution, { comment: '' }))).code).toBe('not-allowed');
  expect(await recipients()).toEqual([]);
  await Promise.allSettled([approve(solution), approve(solution)]);
  expect((await faultOf(approve(solution))).code).toBe('conflict');
  expect(await recipients()).toEqual([piet.email, mira.email]);
});

it('a night without targets, or one that is photometric, is told to nobody at its approval', async () => {
  const { solution: empty } = await judged('not photometric');
  await approve(empty);
  const { solution: clear } = await judged('photometric', 'Thistle 3');
  await approve(clear);
  expect(await recipients()).toEqual([]);
});
