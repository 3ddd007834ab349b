import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { expect, inject } from 'vitest';
import type { MadeToken, NewToken } from '@/lib/contracts/api/token';
import { createToken } from '@/lib/contracts/api/token';
import type { z } from 'zod';
import { execute, insert, inTransaction, selectOne } from '@/lib/server/data/database';
import { personByEmail } from '@/lib/server/data/people';
import { newPublicId } from '@/lib/server/data/public-id';
import { insertSolution } from '@/lib/server/data/solution-writes';
import { callerOf } from '@/lib/server/identity/caller';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { callApi } from './api';
import { queueJob } from './jobs';
import { addStars, newResult, newSolution } from './results';
import { newPerson, newProgramme, testPassword } from './people';
import { root } from './scripts';
import { noInputs, usualModel } from './solution-json';

/**
 * Who calls, in the order of a row's signs. The observer is the night's, the other observer is not; the PI leads MH26B-04
 * and MH26B-11, the co-investigator is one of MH26B-11 and no more; the outsider leads a programme without a frame in the
 * night; nobody has not signed in.
 */
export const callers = [
  'manager',
  'photometrist',
  'observer',
  'otherObserver',
  'pi',
  'coinvestigator',
  'outsider',
  'nobody',
] as const;
export type CallerName = (typeof callers)[number];

type Credentials = Pick<z.input<typeof NewToken>, 'email' | 'password'>;

/** A closed night of the demo with something of everything that an operation can be about, all by public id. */
export interface RightsWorld {
  readonly night: string;
  /** A frame of MH26B-04, of which the PI is a member and the co-investigator is not. */
  readonly frame: string;
  readonly condition: string;
  /** A set with standards only, in use: who may take it back or check it again is told that it is too late. */
  readonly set: string;
  /** A draft that has not been solved. */
  readonly solution: string;
  /** A superseded solution with a magnitude of MH26B-11. */
  readonly calibrated: string;
  /** A job of the observer's, done, that works on the draft. */
  readonly job: string;
  /** Bytes that the night has already. */
  readonly table: string;
  readonly newRemark: () => Promise<string>;
  readonly newTimeLoss: () => Promise<string>;
  readonly credentials: (caller: CallerName) => Credentials;
  /** Undefined for nobody. */
  readonly token: (caller: CallerName) => string | undefined;
  /** Removes what lies in the night because of this. */
  readonly dispose: () => Promise<void>;
}

/** In the text of every remark and time lost, so that they can be removed again. */
export const mark = 'written to see who may';
const date = '2026-11-03';

async function idOf(
  sql: string,
  values: Record<string, string | number>,
): Promise<{ id: number; publicId: string }> {
  const row = await selectOne<{ id: number; publicId: string }>(sql, values);
  if (!row) throw new Error(`The demo has no such row: ${sql}`);
  return row;
}

async function allCredentials(): Promise<Record<CallerName, Credentials>> {
  const demo = (account: string): Credentials => ({
    email: `${account}@evenfall.example`,
    password: inject('demoPassword'),
  });
  const elsewhere = await newProgramme(`X-${newPublicId().slice(0, 6)}`);
  const { id: marrow } = await idOf('SELECT id, public_id AS publicId FROM programmes WHERE code = :code', {
    code: 'MH26B-11',
  });
  const otherObserver = await newPerson({ roles: ['observer'] });
  // The demo's own co-investigator leads another programme of the same night.
  const coinvestigator = await newPerson({ programmes: { [marrow]: 'coinvestigator' } });
  const outsider = await newPerson({ programmes: { [elsewhere]: 'pi' } });
  return {
    manager: demo('manager'),
    photometrist: demo('photometrist'),
    observer: demo('observer'),
    otherObserver: { email: otherObserver.email, password: testPassword },
    pi: demo('pi'),
    coinvestigator: { email: coinvestigator.email, password: testPassword },
    outsider: { email: outsider.email, password: testPassword },
    // Who is at the door has an address and a password, and no token yet.
    nobody: demo('observer'),
  };
}

/** A copy of the night's standards, so that no call changes the demo's own set. */
async function newSetInUse(nightId: number): Promise<{ id: number; publicId: string }> {
  const publicId = newPublicId();
  const id = await insert(
    `INSERT INTO measurement_sets (public_id, night_id, kind, name, state, file_name, content_type, size, sha256,
                                   tolerance, mapping, comments, n_rows, n_matched, uploaded_by_id)
     SELECT :publicId, night_id, kind, name, 'in use', file_name, content_type, size, sha256,
            tolerance, mapping, comments, 0, 0, uploaded_by_id
       FROM measurement_sets WHERE night_id = :nightId AND kind = 'standard' ORDER BY id LIMIT 1`,
    { publicId, nightId },
    null,
  );
  await execute(
    `INSERT INTO measurement_set_frames (set_id, frame_id, n_rows)
     SELECT :id, id, 1 FROM frames WHERE night_id = :nightId AND type = 'standard'`,
    { id, nightId },
    null,
  );
  return { id, publicId };
}

/** A draft without a job, so that it stays one. */
async function newDraft(nightId: number, createdById: number): Promise<{ id: number; publicId: string }> {
  const publicId = newPublicId();
  const { id } = await inTransaction((tx) =>
    insertSolution(tx, {
      publicId,
      nightId,
      model: usualModel,
      inputs: noInputs,
      softwareVersion: '0.0.0',
      followsId: null,
      createdById,
    }),
  );
  await execute(
    'INSERT INTO solution_nights (solution_id, night_id) VALUES (:id, :nightId)',
    { id, nightId },
    null,
  );
  return { id, publicId };
}

/** A superseded solution with one magnitude of a programme that the PI and the co-investigator share. */
async function newCalibrated(night: { publicId: string }, personId: number): Promise<string> {
  const by = { personId } as PersonCaller;
  const { id: programme } = await idOf(
    'SELECT id, public_id AS publicId FROM programmes WHERE code = :code',
    {
      code: 'MH26B-11',
    },
  );
  const solution = await newSolution({ night: night.publicId, number: 900, state: 'superseded', by });
  const result = await newResult({ solution, night: night.publicId, programme });
  await addStars(result, [{ no: 1, star: 'LV Marrow', v: 12 }]);
  return solution.publicId;
}

/** Removes the draft, and whatever was solved since. */
async function removeSolutions(nightId: number, firstId: number): Promise<void> {
  const values = { nightId, firstId };
  const ofNight = `kind = 'solve-night' AND night_id = :nightId`;
  await execute(
    `UPDATE jobs SET state = 'cancelled', dedupe_key = NULL, finished_at = NOW(3) WHERE ${ofNight} AND state = 'queued'`,
    values,
    null,
  );
  const running = (): Promise<unknown> =>
    selectOne(`SELECT id FROM jobs WHERE ${ofNight} AND state = 'running' LIMIT 1`, values);
  while ((await running()) !== null) await pause(100);
  const those = 'SELECT id FROM solutions WHERE night_id = :nightId AND id >= :firstId';
  await execute(
    `DELETE k FROM solution_coefficients k JOIN solution_bands b ON b.id = k.solution_band_id
      WHERE b.solution_id IN (${those})`,
    values,
    null,
  );
  await execute(
    `DELETE c FROM calibrated_magnitudes c JOIN transformations t ON t.id = c.transformation_id
      WHERE t.solution_id IN (${those})`,
    values,
    null,
  );
  await execute(`DELETE FROM transformations WHERE solution_id IN (${those})`, values, null);
  const tables = ['bands', 'observations', 'exclusions', 'comments', 'sets', 'nights'];
  for (const table of tables) {
    await execute(`DELETE FROM solution_${table} WHERE solution_id IN (${those})`, values, null);
  }
  await execute(`DELETE FROM solutions WHERE night_id = :nightId AND id >= :firstId`, values, null);
}

async function newDoneJob(nightId: number, solution: string): Promise<string> {
  const person = await personByEmail('observer@evenfall.example');
  const caller = person && (await callerOf(person.id, { via: 'session', requestId: 'test' }));
  if (!caller) throw new Error('The demo has no observer.');
  // Never begun: what it would find is not what the rights are about.
  const runAfter = new Date(Date.now() + 3_600_000);
  const id = await queueJob({ kind: 'solve-night', payload: { solution }, nightId, runAfter }, caller);
  await execute(`UPDATE jobs SET state = 'done', finished_at = NOW(3) WHERE public_id = :id`, { id }, null);
  return id;
}

/** Arranges the world in the database of the running application. */
export async function newRightsWorld(): Promise<RightsWorld> {
  const night = await idOf('SELECT id, public_id AS publicId FROM nights WHERE date = :date', { date });
  const inNight = { nightId: night.id };
  const frame = await idOf(
    `SELECT f.id, f.public_id AS publicId FROM frames f JOIN programmes p ON p.id = f.programme_id
      WHERE f.night_id = :nightId AND p.code = 'MH26B-04' LIMIT 1`,
    inNight,
  );
  const condition = await idOf(
    'SELECT id, public_id AS publicId FROM conditions WHERE night_id = :nightId LIMIT 1',
    inNight,
  );
  const { id: writer } = await idOf('SELECT id, public_id AS publicId FROM people WHERE email = :email', {
    email: 'observer@evenfall.example',
  });
  const set = await newSetInUse(night.id);
  const draft = await newDraft(night.id, writer);
  const credentials = await allCredentials();
  const tokens = new Map<CallerName, string>();
  for (const caller of callers.filter((each) => each !== 'nobody')) {
    const body = { ...credentials[caller], name: `rights ${newPublicId()}` };
    const made = await callApi(createToken, { body });
    expect(made.status, made.text).toBe(201);
    tokens.set(caller, (made.body as z.infer<typeof MadeToken>).token);
  }
  const values = (): { publicId: string; nightId: number; writer: number; mark: string } => ({
    publicId: newPublicId(),
    nightId: night.id,
    writer,
    mark,
  });
  return {
    night: night.publicId,
    frame: frame.publicId,
    condition: condition.publicId,
    set: set.publicId,
    solution: draft.publicId,
    calibrated: await newCalibrated(night, writer),
    job: await newDoneJob(night.id, draft.publicId),
    table: await readFile(path.join(root, `fixtures/uploads/${date}-standards.csv`), 'utf8'),
    newRemark: async () => {
      const remark = values();
      await insert(
        `INSERT INTO remarks (public_id, night_id, utc, text, written_by_id)
         VALUES (:publicId, :nightId, '${date} 22:00:00', :mark, :writer)`,
        remark,
        null,
      );
      return remark.publicId;
    },
    newTimeLoss: async () => {
      const loss = values();
      await insert(
        `INSERT INTO time_losses (public_id, night_id, cause, minutes, comment, recorded_by_id)
         VALUES (:publicId, :nightId, 'other', 1, :mark, :writer)`,
        loss,
        null,
      );
      return loss.publicId;
    },
    credentials: (caller) => credentials[caller],
    token: (caller) => tokens.get(caller),
    dispose: async () => {
      const id = { id: set.id };
      await removeSolutions(night.id, draft.id);
      await execute('DELETE FROM measurement_set_frames WHERE set_id = :id', id, null);
      await execute('DELETE FROM measurement_sets WHERE id = :id', id, null);
      await execute('DELETE FROM remarks WHERE text = :mark', { mark }, null);
      await execute('DELETE FROM time_losses WHERE comment = :mark', { mark }, null);
    },
  };
}
