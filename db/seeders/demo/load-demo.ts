import type { Sequelize, Transaction } from 'sequelize';
import { newPublicId } from '@/lib/server/data/public-id';
import { Camera } from '../../models/camera';
import { EquipmentEpoch } from '../../models/equipment-epoch';
import { Filter } from '../../models/filter';
import { Observatory } from '../../models/observatory';
import { Programme } from '../../models/programme';
import { ProgrammeMember } from '../../models/programme-member';
import { ProgrammeTarget } from '../../models/programme-target';
import { Site } from '../../models/site';
import { Telescope } from '../../models/telescope';
import { starKey } from '@/lib/contracts/star-name';
import type { DemoObservatory, DemoWorld } from './demo-world';
import { observeNight, type DemoSky, type ObservedNight } from './demo-nights';
import { loadNight } from './load-night';
import { loadPeople, type PersonIds } from './load-people';
import { clockTime, minute_ms } from './night-time';

/** The night in progress with the frames that are in its log, and those that its log misses. */
export interface DemoTonightLog {
  readonly tonight: ObservedNight;
  readonly missing: ObservedNight['frames'];
}

export interface DemoToLoad extends DemoTonightLog {
  readonly world: DemoWorld;
  readonly sky: DemoSky;
  readonly password: string;
}

/** Puts the whole demo into an empty database, in one transaction. */
export async function loadDemo(
  sequelize: Sequelize,
  { world, sky, password, tonight, missing }: DemoToLoad,
): Promise<void> {
  await sequelize.transaction(async (transaction) => {
    const telescope = await loadEquipment(world.observatory, transaction);
    const people = await loadPeople(world.observatory.people, password, transaction);
    const programmes = await loadProgrammes(world.observatory, people, transaction);
    const ids = { telescope, people, programmes };
    for (const plan of world.nights.nights) {
      const observed = observeNight(plan, sky);
      const at = (clock: string): number => clockTime(observed.night, clock);
      const remarks = plan.remarks.map((remark) => ({ utc: at(remark.at), text: remark.text }));
      await loadNight({ ...plan, observed, remarks, closedAt: at(plan.closed_at), ids }, transaction);
    }
    const { observers, remarks } = world.nights.tonight;
    await loadNight(
      {
        observed: tonight,
        observers,
        remarks: [
          ...remarks.map((remark) => ({
            utc: Math.round(tonight.night.dusk / minute_ms + remark.minutes_after_dusk) * minute_ms,
            text: remark.text,
          })),
          ...holeRemark(missing),
        ],
        summary: '',
        time_losses: [],
        closedAt: null,
        ids,
      },
      transaction,
    );
  });
}

function holeRemark(
  missing: ObservedNight['frames'],
): readonly { readonly utc: number; readonly text: string }[] {
  const [first] = missing;
  const last = missing.at(-1);
  if (first === undefined || last === undefined) return [];
  const text = `Link to the dome down. Frames ${first.number} to ${last.number} (${first.object}) were taken but are not in the log yet.`;
  return [{ utc: Math.ceil(last.utcMid / minute_ms + 2) * minute_ms, text }];
}

async function loadEquipment(demo: DemoObservatory, transaction: Transaction): Promise<number> {
  const { name } = demo.observatory;
  const observatory = await Observatory.create({ name, isDemo: true, settings: {} }, { transaction });
  const { mean_extinction: meanExtinction, ...place } = demo.site;
  const site = await Site.create(
    { ...place, meanExtinction, observatoryId: observatory.id },
    { transaction },
  );
  const { code, name: telescopeName, aperture_m: apertureM, min_altitude: minAltitude } = demo.telescope;
  const telescope = await Telescope.create(
    { siteId: site.id, code, name: telescopeName, apertureM, minAltitude },
    { transaction },
  );
  const { camera: seen, epoch } = demo;
  const camera = await Camera.create(
    {
      telescopeId: telescope.id,
      name: seen.name,
      widthPx: seen.width_px,
      heightPx: seen.height_px,
      pixelScale: seen.pixel_scale,
      gain: seen.gain,
      readNoise: seen.read_noise,
      saturation: seen.saturation,
    },
    { transaction },
  );
  await Filter.bulkCreate(
    demo.filters.map(({ band, name: filter, default_exposure: defaultExposure }) => ({
      telescopeId: telescope.id,
      band,
      name: filter,
      defaultExposure,
    })),
    { transaction },
  );
  const { starts_on: startsOn, description, colour_terms: colourTerms } = epoch;
  await EquipmentEpoch.create(
    { telescopeId: telescope.id, cameraId: camera.id, startsOn, description, colourTerms },
    { transaction },
  );
  return telescope.id;
}

async function loadProgrammes(
  { programmes }: DemoObservatory,
  people: PersonIds,
  transaction: Transaction,
): Promise<ReadonlyMap<string, number>> {
  const ids = new Map<string, number>();
  for (const {
    code,
    title,
    summary,
    proprietary_months: proprietaryMonths,
    members,
    targets,
  } of programmes) {
    const programme = await Programme.create(
      { publicId: newPublicId(), code, title, summary, proprietaryMonths },
      { transaction },
    );
    ids.set(code, programme.id);
    await ProgrammeMember.bulkCreate(
      members.map(({ email, role }) => ({
        programmeId: programme.id,
        personId: people.byEmail(email),
        role,
      })),
      { transaction },
    );
    await ProgrammeTarget.bulkCreate(
      targets.map(({ name, kind, ra, dec, note }) => ({
        programmeId: programme.id,
        name,
        nameKey: starKey(name),
        kind,
        ra,
        decl: dec,
        note,
      })),
      { transaction },
    );
  }
  return ids;
}
