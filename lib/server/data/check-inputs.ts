import 'server-only';
import type { Band, FrameType } from '@/lib/contracts/bands';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { NightState } from '@/lib/contracts/api/night';
import { select, selectOne, type Tx } from './database';

/** A frame as a table's check needs it. */
export interface CheckFrame {
  readonly id: number;
  readonly number: number;
  readonly file: string | null;
  readonly type: FrameType;
  readonly band: Band | null;
  readonly exposure_s: number;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
}

/** Every frame of a night, in one compact list. `forShare` holds them for the transaction. */
export async function checkFrames(
  nightId: number,
  tx: Tx | null = null,
  forShare = false,
): Promise<readonly CheckFrame[]> {
  const rows = await select<Omit<CheckFrame, 'utcStart'> & { utcStart: Date }>(
    `SELECT id, number, file, type, band, exposure AS exposure_s, utc_start AS utcStart
       FROM frames WHERE night_id = :nightId ORDER BY id${forShare ? ' LOCK IN SHARE MODE' : ''}`,
    { nightId },
    tx,
  );
  return rows.map((row) => ({ ...row, utcStart: row.utcStart.getTime() }));
}

export interface CheckNight {
  readonly id: number;
  readonly state: NightState;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly telescopeId: number;
}

export async function checkNight(nightId: number, tx: Tx | null = null): Promise<CheckNight> {
  const night = await selectOne<CheckNight>(
    `SELECT id, state, starts_at AS startsAt, ends_at AS endsAt, telescope_id AS telescopeId
       FROM nights WHERE id = :nightId`,
    { nightId },
    tx,
  );
  if (!night) throw new Error(`The night ${nightId} is gone from under its measurement set.`);
  return night;
}

export interface CheckStandard {
  readonly id: number;
  readonly name: string;
  readonly nameKey: string;
  readonly field: string;
  readonly ra: number;
  readonly decl: number;
  readonly pmRa: number | null;
  readonly pmDec: number | null;
  readonly isUsable: number;
  readonly caution: string;
}

/** Every standard star: some thousands at most. */
export async function checkStandards(): Promise<readonly CheckStandard[]> {
  return select<CheckStandard>(
    `SELECT id, name, name_key AS nameKey, field, ra, decl, pm_ra AS pmRa, pm_dec AS pmDec,
            is_usable AS isUsable, caution FROM standard_stars ORDER BY id`,
  );
}

export interface TargetPlace {
  readonly programmeId: number;
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
}

/** Targets that a person's new frames could show: of every programme for staff, of their own for investigators. */
export async function targetPlaces(personId: number): Promise<readonly TargetPlace[]> {
  return select<TargetPlace>(
    `SELECT r.programme_id AS programmeId, r.name, r.ra, r.decl AS \`dec\`
       FROM programme_targets r JOIN programmes g ON g.id = r.programme_id
      WHERE g.archived_at IS NULL
        AND (EXISTS (SELECT 1 FROM person_roles w WHERE w.person_id = :personId)
          OR EXISTS (SELECT 1 FROM programme_members b WHERE b.programme_id = g.id AND b.person_id = :personId))`,
    { personId },
  );
}

export interface MappingRow {
  readonly headers: readonly string[];
  readonly mapping: ColumnMapping;
  readonly savedBy: string;
  readonly savedAt: Date;
}

/** How tables of a telescope are read, the newest first. */
export async function mappingsOf(telescopeId: number): Promise<readonly MappingRow[]> {
  return select<MappingRow>(
    `SELECT c.headers, c.mapping, p.name AS savedBy, c.saved_at AS savedAt
       FROM column_mappings c JOIN people p ON p.id = c.saved_by_id
      WHERE c.telescope_id = :telescopeId ORDER BY c.saved_at DESC LIMIT 200`,
    { telescopeId },
  );
}
