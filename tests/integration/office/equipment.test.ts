import { beforeEach, describe, expect, it } from 'vitest';
import { ChangeEpoch, ChangeSite } from '@/lib/contracts/equipment';
import { saveCamera } from '@/lib/server/acts/save-camera';
import { saveEpoch } from '@/lib/server/acts/save-epoch';
import { saveSite } from '@/lib/server/acts/save-site';
import { saveTelescope } from '@/lib/server/acts/save-telescope';
import { setFilters } from '@/lib/server/acts/set-filters';
import { execute, insert, selectOne } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { equipment } from '@/lib/server/reads/equipment';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller, newObservatory } from '@/tests/support/people';

let count = 0;
let manager: PersonCaller;
let photometrist: PersonCaller;
let site: string;
let code: string;

const place = { longitude: -17.25, latitude: 28.31, elevation: 2300, timezone: 'Atlantic/Canary' };
const camera = {
  camera: '',
  name: 'Lantern',
  width: 2048,
  height: 2048,
  pixelScale: 0.5,
  gain: 1.4,
  readNoise: 5,
  saturation: 60_000,
};
const epoch = { epoch: '', camera: 'Lantern', description: 'New coating', colourTerms: {} };
const shown = async () => (await equipment(manager)).telescopes.find((one) => one.code === code);

beforeEach(async () => {
  if (!(await selectOne('SELECT id FROM observatories'))) await newObservatory();
  manager = await newCaller({ roles: ['manager'] });
  photometrist = await newCaller({ roles: ['photometrist'] });
  count += 1;
  site = `Ridge ${count}`;
  code = `tube-${count}`;
  await saveSite(manager, { site: '', name: site, ...place, meanExtinction: {} });
  await saveTelescope(photometrist, {
    telescope: '',
    code,
    name: 'Tube',
    site,
    aperture: 0.8,
    minAltitude: 15,
    retiredOn: null,
  });
});

describe('the equipment', () => {
  it('is seen by everybody who is signed in, and changed by managers and photometrists', async () => {
    const observer = await newCaller({ roles: ['observer'] });
    expect((await equipment(observer)).mayManage).toBe(false);
    expect((await faultOf(saveCamera(observer, { telescope: code, ...camera }))).code).toBe('not-allowed');
    await saveCamera(photometrist, { telescope: code, ...camera });
    expect((await shown())?.cameras).toMatchObject([{ name: 'Lantern', gain: 1.4 }]);
  });

  it('lies on sites, which only a manager changes', async () => {
    const values = { site, name: site, ...place, elevation: 2310, meanExtinction: {} };
    expect((await faultOf(saveSite(photometrist, values))).code).toBe('not-allowed');
    await saveSite(manager, values);
    expect((await equipment(manager)).sites.find(({ name }) => name === site)?.elevation).toBe(2310);
    expect((await faultOf(saveSite(manager, { ...values, site: '' }))).issues).toMatchObject([
      { path: 'name' },
    ]);
  });

  it('has one telescope for each code, and keeps the code', async () => {
    const again = { telescope: '', code, name: 'x', site, aperture: 1, minAltitude: 20, retiredOn: null };
    expect((await faultOf(saveTelescope(manager, again))).issues).toMatchObject([{ path: 'code' }]);
    await saveTelescope(manager, { ...again, telescope: code, name: 'Better tube' });
    expect(await shown()).toMatchObject({ code, name: 'Better tube', minAltitude: 20 });
    const nowhere = saveTelescope(manager, { ...again, telescope: code, site: 'Nowhere' });
    expect((await faultOf(nowhere)).issues).toMatchObject([{ path: 'site', value: 'Nowhere' }]);
  });

  it('keeps a band that has frames, and lets others go', async () => {
    const filter = (band: 'B' | 'V') => ({ band, name: band, defaultExposure: null });
    await setFilters(manager, { telescope: code, filters: [filter('B'), filter('V')] });
    const telescope = await selectOne<{ id: number }>('SELECT id FROM telescopes WHERE code = :code', {
      code,
    });
    const night = await insert(
      `INSERT INTO nights (public_id, telescope_id, date, starts_at, ends_at, summary, opened_by_id)
       VALUES (:publicId, :telescope, '2026-11-03', '2026-11-03 12:00', '2026-11-04 12:00', '', :person)`,
      { publicId: newPublicId(), telescope: telescope?.id ?? 0, person: manager.personId },
      null,
    );
    await execute(
      `INSERT INTO frames (public_id, night_id, number, type, band, utc_start, exposure, utc_mid, sun_altitude, origin, logged_by_id)
       VALUES (:publicId, :night, 1, 'flat', 'B', '2026-11-03 18:00', 5, '2026-11-03 18:00', -3, 'log', :person)`,
      { publicId: newPublicId(), night, person: manager.personId },
      null,
    );
    const stuck = await faultOf(setFilters(manager, { telescope: code, filters: [filter('V')] }));
    expect(stuck).toMatchObject({ code: 'conflict', issues: [{ path: 'hasB' }] });
    await setFilters(manager, { telescope: code, filters: [filter('B')] });
    expect((await shown())?.filters.map(({ band }) => band)).toEqual(['B']);
  });

  it('has epochs that do not overlap, though two people add them at once', async () => {
    await saveCamera(manager, { telescope: code, ...camera });
    const from = (startsOn: string, endsOn: string | null) =>
      saveEpoch(manager, { telescope: code, ...epoch, startsOn, endsOn });
    await from('2026-01-01', '2026-06-01');
    await from('2026-06-01', null);
    expect((await faultOf(from('2026-05-31', '2026-06-01'))).code).toBe('conflict');
    expect((await faultOf(from('2027-01-01', null))).issues).toMatchObject([{ path: 'startsOn' }]);
    const both = await Promise.allSettled([
      from('2025-01-01', '2025-07-01'),
      from('2025-03-01', '2025-09-01'),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect((await shown())?.epochs).toHaveLength(3);
  });

  it('takes a value per band only together with its error', () => {
    const form = {
      telescope: code,
      epoch: '',
      camera: 'x',
      startsOn: '2026-01-01',
      description: 'x',
      termB: '0.08',
    };
    expect(ChangeEpoch.safeParse(form).error?.issues.map(({ path }) => path)).toEqual([['errorB']]);
    const parsed = ChangeEpoch.parse({ ...form, errorB: '0.003' });
    expect(parsed.colourTerms).toEqual({ B: { value: 0.08, error: 0.003 } });
  });

  it('is refused in a time zone that does not exist', () => {
    const form = { site: '', name: 'x', longitude: '0', latitude: '0', elevation: '0', extinctionSource: '' };
    const parsed = ChangeSite.safeParse({ ...form, timezone: 'Atlantis/Capital' });
    expect(parsed.error?.issues.map(({ path }) => path)).toEqual([['timezone']]);
  });
});
