import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import { execute, insert, select, selectOne, type Tx } from './database';

export interface SiteRow {
  readonly id: number;
  readonly name: string;
  /** deg, east positive */
  readonly longitude: number;
  /** deg, north positive */
  readonly latitude: number;
  /** m */
  readonly elevation: number;
  readonly timezone: string;
  /** Per band: mean, sigma and source; lib/contracts/equipment reads it. */
  readonly meanExtinction: unknown;
}

export interface TelescopeRow {
  readonly id: number;
  readonly siteId: number;
  readonly code: string;
  readonly name: string;
  readonly aperture_m: number;
  /** deg */
  readonly minAltitude: number;
  readonly retiredOn: string | null;
}

export interface CameraRow {
  readonly id: number;
  readonly telescopeId: number;
  readonly name: string;
  readonly width_px: number;
  readonly height_px: number;
  /** arcsec per pixel */
  readonly pixelScale: number;
  /** electrons per count */
  readonly gain: number;
  /** electrons rms */
  readonly readNoise: number;
  /** counts */
  readonly saturation: number;
}

export interface FilterRow {
  readonly telescopeId: number;
  readonly band: Band;
  readonly name: string;
  /** s */
  readonly defaultExposure: number | null;
}

export interface EpochRow {
  readonly id: number;
  readonly telescopeId: number;
  readonly cameraId: number;
  readonly startsOn: string;
  readonly endsOn: string | null;
  readonly description: string;
  readonly colourTerms: unknown;
}

const siteColumns = `id, name, longitude, latitude, elevation, timezone, mean_extinction AS meanExtinction`;
const telescopeColumns = `t.id, t.site_id AS siteId, t.code, t.name, t.aperture_m, t.min_altitude AS minAltitude,
  DATE_FORMAT(t.retired_on, '%Y-%m-%d') AS retiredOn`;
const cameraColumns = `id, telescope_id AS telescopeId, name, width_px, height_px, pixel_scale AS pixelScale, gain,
  read_noise AS readNoise, saturation`;
const epochColumns = `id, telescope_id AS telescopeId, camera_id AS cameraId, DATE_FORMAT(starts_on, '%Y-%m-%d') AS startsOn, DATE_FORMAT(ends_on, '%Y-%m-%d') AS endsOn,
  description, colour_terms AS colourTerms`;

/** The order of bands everywhere: blue to red. */
const bandOrder = "FIELD(band, 'U', 'B', 'V', 'R', 'I')";

export async function sites(tx: Tx | null = null): Promise<readonly SiteRow[]> {
  return select<SiteRow>(`SELECT ${siteColumns} FROM sites ORDER BY name`, {}, tx);
}

export interface TelescopePage {
  /** Code after which the page begins. */
  readonly after?: string | undefined;
  readonly limit: number;
  /** Leaves retired ones out. */
  readonly inUse?: boolean;
}

/** Telescopes by code; retired ones too unless told otherwise, for their nights are still there. */
export async function telescopes(page: TelescopePage = { limit: 1000 }): Promise<readonly TelescopeRow[]> {
  return select<TelescopeRow>(
    `SELECT ${telescopeColumns} FROM telescopes t
      WHERE t.code > :after AND (NOT :inUse OR t.retired_on IS NULL OR t.retired_on > CURRENT_DATE)
      ORDER BY t.code LIMIT :limit`,
    { after: page.after ?? '', limit: page.limit, inUse: page.inUse ?? false },
  );
}

/** The telescope's row, held until the transaction ends: what belongs to it changes one at a time. */
export async function lockTelescope(code: string, tx: Tx): Promise<TelescopeRow | null> {
  return selectOne<TelescopeRow>(
    `SELECT ${telescopeColumns} FROM telescopes t WHERE t.code = :code FOR UPDATE`,
    { code },
    tx,
  );
}

/** Filters of the telescopes, of each from blue to red. */
export async function filtersOf(
  telescopeIds: readonly number[],
  tx: Tx | null = null,
): Promise<readonly FilterRow[]> {
  if (telescopeIds.length === 0) return [];
  return select<FilterRow>(
    `SELECT telescope_id AS telescopeId, band, name, default_exposure AS defaultExposure
       FROM filters WHERE telescope_id IN (:telescopeIds) ORDER BY telescope_id, ${bandOrder}`,
    { telescopeIds },
    tx,
  );
}

export async function camerasOf(telescopeId: number, tx: Tx | null = null): Promise<readonly CameraRow[]> {
  return select<CameraRow>(
    `SELECT ${cameraColumns} FROM cameras WHERE telescope_id = :telescopeId ORDER BY name`,
    { telescopeId },
    tx,
  );
}

/** Epochs of a telescope, newest first. */
export async function epochsOf(telescopeId: number, tx: Tx | null = null): Promise<readonly EpochRow[]> {
  return select<EpochRow>(
    `SELECT ${epochColumns} FROM equipment_epochs WHERE telescope_id = :telescopeId ORDER BY starts_on DESC`,
    { telescopeId },
    tx,
  );
}

export type NewSite = Omit<SiteRow, 'id' | 'meanExtinction'> & { readonly meanExtinction: object };

export async function insertSite(observatoryId: number, site: NewSite, tx: Tx): Promise<number> {
  return insert(
    `INSERT INTO sites (observatory_id, name, longitude, latitude, elevation, timezone, mean_extinction)
     VALUES (:observatoryId, :name, :longitude, :latitude, :elevation, :timezone, :meanExtinction)`,
    { ...site, observatoryId, meanExtinction: JSON.stringify(site.meanExtinction) },
    tx,
  );
}

export async function updateSite(id: number, site: NewSite, tx: Tx): Promise<void> {
  await execute(
    `UPDATE sites SET name = :name, longitude = :longitude, latitude = :latitude, elevation = :elevation,
            timezone = :timezone, mean_extinction = :meanExtinction WHERE id = :id`,
    { ...site, id, meanExtinction: JSON.stringify(site.meanExtinction) },
    tx,
  );
}

export type NewTelescope = Omit<TelescopeRow, 'id'>;

/** Adds a telescope; null when the code is taken. */
export async function insertTelescope(telescope: NewTelescope, tx: Tx): Promise<number | null> {
  const id = await insert(
    `INSERT IGNORE INTO telescopes (site_id, code, name, aperture_m, min_altitude, retired_on)
     VALUES (:siteId, :code, :name, :aperture_m, :minAltitude, :retiredOn)`,
    { ...telescope },
    tx,
  );
  return id > 0 ? id : null;
}

/** Changes all but the code, by which clients know the telescope. */
export async function updateTelescope(
  id: number,
  telescope: Omit<NewTelescope, 'code'>,
  tx: Tx,
): Promise<void> {
  await execute(
    `UPDATE telescopes SET site_id = :siteId, name = :name, aperture_m = :aperture_m, min_altitude = :minAltitude,
            retired_on = :retiredOn WHERE id = :id`,
    { ...telescope, id },
    tx,
  );
}

export type NewCamera = Omit<CameraRow, 'id'>;

export async function insertCamera(camera: NewCamera, tx: Tx): Promise<number | null> {
  const id = await insert(
    `INSERT IGNORE INTO cameras
       (telescope_id, name, width_px, height_px, pixel_scale, gain, read_noise, saturation)
     VALUES (:telescopeId, :name, :width_px, :height_px, :pixelScale, :gain, :readNoise, :saturation)`,
    { ...camera },
    tx,
  );
  return id > 0 ? id : null;
}

export async function updateCamera(id: number, camera: NewCamera, tx: Tx): Promise<void> {
  await execute(
    `UPDATE cameras SET name = :name, width_px = :width_px, height_px = :height_px, pixel_scale = :pixelScale,
            gain = :gain, read_noise = :readNoise, saturation = :saturation
      WHERE id = :id AND telescope_id = :telescopeId`,
    { ...camera, id },
    tx,
  );
}

export async function upsertFilter(filter: FilterRow, tx: Tx): Promise<void> {
  await execute(
    `INSERT INTO filters (telescope_id, band, name, default_exposure)
     VALUES (:telescopeId, :band, :name, :defaultExposure)
     ON DUPLICATE KEY UPDATE name = VALUES(name), default_exposure = VALUES(default_exposure)`,
    { ...filter },
    tx,
  );
}

export async function deleteFilter(telescopeId: number, band: Band, tx: Tx): Promise<void> {
  await execute(
    'DELETE FROM filters WHERE telescope_id = :telescopeId AND band = :band',
    { telescopeId, band },
    tx,
  );
}

export type NewEpoch = Omit<EpochRow, 'id' | 'colourTerms'> & { readonly colourTerms: object };

export async function insertEpoch(epoch: NewEpoch, tx: Tx): Promise<number> {
  return insert(
    `INSERT INTO equipment_epochs (telescope_id, camera_id, starts_on, ends_on, description, colour_terms)
     VALUES (:telescopeId, :cameraId, :startsOn, :endsOn, :description, :colourTerms)`,
    { ...epoch, colourTerms: JSON.stringify(epoch.colourTerms) },
    tx,
  );
}

export async function updateEpoch(id: number, epoch: NewEpoch, tx: Tx): Promise<void> {
  await execute(
    `UPDATE equipment_epochs SET camera_id = :cameraId, starts_on = :startsOn, ends_on = :endsOn,
            description = :description, colour_terms = :colourTerms
      WHERE id = :id AND telescope_id = :telescopeId`,
    { ...epoch, id, colourTerms: JSON.stringify(epoch.colourTerms) },
    tx,
  );
}

/** Bands in which the telescope has frames. */
export async function bandsWithFrames(telescopeId: number, tx: Tx): Promise<readonly Band[]> {
  const rows = await select<{ band: Band }>(
    `SELECT DISTINCT f.band FROM frames f JOIN nights n ON n.id = f.night_id
      WHERE n.telescope_id = :telescopeId AND f.band IS NOT NULL`,
    { telescopeId },
    tx,
  );
  return rows.map(({ band }) => band);
}
