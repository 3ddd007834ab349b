import 'server-only';
import type { ProgrammeRole } from '@/lib/contracts/roles';
import type { Scope } from '@/lib/server/policy/scope';
import { execute, insert, select, selectOne, type Tx } from './database';
import { visibleResults } from './visible';

export interface ProgrammeRow {
  readonly id: number;
  readonly publicId: string;
  readonly code: string;
  readonly title: string;
  readonly summary: string;
  readonly proprietaryMonths: number;
  /** When the PI ended the period early. */
  readonly proprietaryEndedAt: Date | null;
  /** Last day on which data of the latest night are proprietary; null without nights. */
  readonly proprietaryUntil: string | null;
  readonly archivedAt: Date | null;
  readonly nNights: number;
}

const nightsOfProgramme =
  'FROM nights n WHERE n.id IN (SELECT f.night_id FROM frames f WHERE f.programme_id = p.id)';
const columns = `p.id, p.public_id AS publicId, p.code, p.title, p.summary, p.proprietary_months AS proprietaryMonths,
  p.proprietary_ended_at AS proprietaryEndedAt, p.archived_at AS archivedAt,
  DATE_FORMAT(COALESCE(DATE(p.proprietary_ended_at),
    (SELECT MAX(n.date) ${nightsOfProgramme}) + INTERVAL p.proprietary_months MONTH), '%Y-%m-%d') AS proprietaryUntil,
  (SELECT COUNT(*) ${nightsOfProgramme}) AS nNights`;

const visible = '(:all OR p.id IN (:programmeIds))';
const scopeValues = (scope: Scope) => ({
  all: scope.all,
  // An empty list is no list in SQL; no programme has the id 0.
  programmeIds: [0, ...scope.programmeIds],
});

export interface ProgrammePage {
  /** Code after which the page begins. */
  readonly after?: string | undefined;
  readonly limit: number;
}

/** Programmes that the scope lets see, by code. */
export async function programmes(scope: Scope, page: ProgrammePage): Promise<readonly ProgrammeRow[]> {
  return select<ProgrammeRow>(
    `SELECT ${columns} FROM programmes p WHERE ${visible} AND p.code > :after ORDER BY p.code LIMIT :limit`,
    { ...scopeValues(scope), after: page.after ?? '', limit: page.limit },
  );
}

export async function programmeByCode(scope: Scope, code: string): Promise<ProgrammeRow | null> {
  return selectOne<ProgrammeRow>(`SELECT ${columns} FROM programmes p WHERE ${visible} AND p.code = :code`, {
    ...scopeValues(scope),
    code,
  });
}

/** The programme's row, held until the transaction ends: what belongs to it changes one at a time. */
export async function lockProgramme(code: string, tx: Tx): Promise<ProgrammeRow | null> {
  const held = await selectOne('SELECT id FROM programmes WHERE code = :code FOR UPDATE', { code }, tx);
  return (
    held && selectOne<ProgrammeRow>(`SELECT ${columns} FROM programmes p WHERE p.code = :code`, { code }, tx)
  );
}

/** Codes of programmes by internal id, for naming a person's own. */
export async function programmeCodes(
  ids: readonly number[],
): Promise<ReadonlyMap<number, { code: string; title: string }>> {
  if (ids.length === 0) return new Map();
  const rows = await select<{ id: number; code: string; title: string }>(
    'SELECT id, code, title FROM programmes WHERE id IN (:ids) ORDER BY code',
    { ids },
  );
  return new Map(rows.map(({ id, code, title }) => [id, { code, title }]));
}

export interface TargetRow {
  readonly id: number;
  readonly programmeId: number;
  readonly name: string;
  readonly kind: 'star' | 'cluster' | 'field';
  /** deg J2000 */
  readonly ra: number;
  /** deg J2000 */
  readonly dec: number;
  readonly note: string;
}

export async function targetsOf(
  programmeIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly TargetRow[]> {
  if (programmeIds.length === 0) return [];
  return select<TargetRow>(
    `SELECT id, programme_id AS programmeId, name, kind, ra, decl AS \`dec\`, note
       FROM programme_targets WHERE programme_id IN (:programmeIds) ORDER BY programme_id, name`,
    { programmeIds },
    tx,
  );
}

export interface MemberRow {
  readonly programmeId: number;
  readonly personId: number;
  readonly person: string;
  readonly name: string;
  readonly email: string;
  readonly role: ProgrammeRole;
  readonly isDisabled: boolean;
}

/** Members of the programmes, of each the principal investigators first. */
export async function membersOf(
  programmeIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly MemberRow[]> {
  if (programmeIds.length === 0) return [];
  const rows = await select<Omit<MemberRow, 'isDisabled'> & { isDisabled: number }>(
    `SELECT m.programme_id AS programmeId, p.id AS personId, p.public_id AS person, p.name, p.email, m.role,
            p.disabled_at IS NOT NULL AS isDisabled
       FROM programme_members m JOIN people p ON p.id = m.person_id
      WHERE m.programme_id IN (:programmeIds) ORDER BY m.programme_id, m.role = 'pi' DESC, p.name`,
    { programmeIds },
    tx,
  );
  return rows.map((row) => ({ ...row, isDisabled: row.isDisabled === 1 }));
}

export interface NewProgramme {
  readonly publicId: string;
  readonly code: string;
  readonly title: string;
  readonly summary: string;
  readonly proprietaryMonths: number;
}

/** Adds a programme; null when the code is taken. */
export async function insertProgramme(programme: NewProgramme, tx: Tx): Promise<number | null> {
  const id = await insert(
    `INSERT IGNORE INTO programmes (public_id, code, title, summary, proprietary_months)
     VALUES (:publicId, :code, :title, :summary, :proprietaryMonths)`,
    { ...programme },
    tx,
  );
  return id > 0 ? id : null;
}

export async function updateProgramme(
  id: number,
  programme: Omit<NewProgramme, 'publicId' | 'code'>,
  tx: Tx,
): Promise<void> {
  await execute(
    `UPDATE programmes SET title = :title, summary = :summary, proprietary_months = :proprietaryMonths WHERE id = :id`,
    { ...programme, id },
    tx,
  );
}

/** Ends the proprietary period now; false when it was ended before. */
export async function endProprietaryPeriod(id: number, tx: Tx): Promise<boolean> {
  const ended = await execute(
    'UPDATE programmes SET proprietary_ended_at = NOW(3) WHERE id = :id AND proprietary_ended_at IS NULL',
    { id },
    tx,
  );
  return ended === 1;
}

export async function setMember(
  programmeId: number,
  personId: number,
  role: ProgrammeRole,
  tx: Tx,
): Promise<void> {
  await execute(
    `INSERT INTO programme_members (programme_id, person_id, role) VALUES (:programmeId, :personId, :role)
     ON DUPLICATE KEY UPDATE role = VALUES(role)`,
    { programmeId, personId, role },
    tx,
  );
}

export async function removeMember(programmeId: number, personId: number, tx: Tx): Promise<boolean> {
  const removed = await execute(
    'DELETE FROM programme_members WHERE programme_id = :programmeId AND person_id = :personId',
    { programmeId, personId },
    tx,
  );
  return removed === 1;
}

export interface NewTarget {
  readonly programmeId: number;
  readonly name: string;
  readonly nameKey: string;
  readonly kind: TargetRow['kind'];
  readonly ra: number;
  readonly dec: number;
  readonly note: string;
}

/** Adds a target; false when the programme has one of that name. */
export async function insertTarget(target: NewTarget, tx: Tx): Promise<boolean> {
  const id = await insert(
    `INSERT IGNORE INTO programme_targets (programme_id, name, name_key, kind, ra, decl, note)
     VALUES (:programmeId, :name, :nameKey, :kind, :ra, :dec, :note)`,
    { ...target },
    tx,
  );
  return id > 0;
}

export async function targetByKey(programmeId: number, nameKey: string, tx: Tx): Promise<TargetRow | null> {
  return selectOne<TargetRow>(
    `SELECT id, programme_id AS programmeId, name, kind, ra, decl AS \`dec\`, note
       FROM programme_targets WHERE programme_id = :programmeId AND name_key = :nameKey`,
    { programmeId, nameKey },
    tx,
  );
}

export async function updateTarget(id: number, target: NewTarget, tx: Tx): Promise<void> {
  await execute(
    `UPDATE programme_targets SET name = :name, name_key = :nameKey, kind = :kind, ra = :ra, decl = :dec, note = :note
      WHERE id = :id AND programme_id = :programmeId`,
    { ...target, id },
    tx,
  );
}

export async function deleteTarget(id: number, tx: Tx): Promise<boolean> {
  return (await execute('DELETE FROM programme_targets WHERE id = :id', { id }, tx)) === 1;
}

/** Archives or takes back; false when it is so already. */
export async function setArchived(id: number, isArchived: boolean, tx: Tx): Promise<boolean> {
  const changed = await execute(
    `UPDATE programmes SET archived_at = IF(:isArchived, NOW(3), NULL)
      WHERE id = :id AND (archived_at IS NOT NULL) <> :isArchived`,
    { id, isArchived },
    tx,
  );
  return changed === 1;
}

export interface ProgrammeNight {
  readonly night: string;
  readonly date: string;
  readonly telescope: string;
  readonly state: string;
  /** The programme's own. */
  readonly frames: number;
  /** Of the solution that is approved now. */
  readonly verdict: string | null;
  /** Stars with calibrated magnitudes by it; null while there are none, or where they are not in the scope. */
  readonly stars: number | null;
}

/** Nights with frames of the programme, the latest first. The scope says whose calibrated magnitudes may be told of. */
export async function nightsWith(scope: Scope, programmeId: number): Promise<readonly ProgrammeNight[]> {
  const results = visibleResults(scope);
  return select<ProgrammeNight>(
    `SELECT n.public_id AS night, DATE_FORMAT(n.date, '%Y-%m-%d') AS date, l.name AS telescope, n.state,
            f.frames, r.verdict, r.stars
       FROM (SELECT night_id, COUNT(*) AS frames FROM frames WHERE programme_id = :programmeId GROUP BY night_id) f
       JOIN nights n ON n.id = f.night_id JOIN telescopes l ON l.id = n.telescope_id
       LEFT JOIN (SELECT t.night_id, s.verdict, t.n_stars AS stars
                    FROM transformations t JOIN solutions s ON s.id = t.solution_id AND s.state = 'approved'
                   WHERE t.programme_id = :programmeId AND t.state = 'done' AND ${results.sql}) r ON r.night_id = n.id
      ORDER BY n.date DESC, l.code`,
    { programmeId, ...results.values },
  );
}
