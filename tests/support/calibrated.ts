import { airmassAt, exposureSky } from '@/lib/astro/exposure-airmass';
import { directionOf } from '@/lib/astro/vector';
import { FrameInput } from '@/lib/contracts/api/frame';
import { createRandom } from '@/lib/numerics/random';
import { instrumentalOffset, type BandCoefficients } from '@/lib/photometry/transformation-model';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { execute, insert, select, selectOne } from '@/lib/server/data/database';
import { newPublicId } from '@/lib/server/data/public-id';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { transformTargets } from '@/workers/handlers/transform-targets';
import type { JobRun } from '@/workers/handler';

/** Truth of the simulated night, per band. */
export const truth = {
  B: coefficients(-21.4, 0.24, 0.08, -0.03),
  V: coefficients(-21.9, 0.14, -0.05, 0),
} as const;
type TrueBand = keyof typeof truth;

function coefficients(
  zeroPoint: number,
  extinction: number,
  colourTerm: number,
  secondOrderExtinction: number,
): BandCoefficients {
  return {
    zeroPoint,
    extinction,
    colourTerm,
    secondOrderExtinction,
    drift: 0,
    extinctionDrift: 0,
    colourTerm2: 0,
  };
}

const site = { longitude: -17.25, latitude: 28.31, elevation: 2300 };
export const scatter = 0.01;

export interface TrueStar {
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
  readonly V: number;
  readonly BV: number;
}

/** Stars of a field, seeded. */
export function trueStars(
  n: number,
  field: { readonly name: string; readonly ra: number; readonly dec: number },
  seed = 1,
): readonly TrueStar[] {
  const random = createRandom(seed);
  return Array.from({ length: n }, (_, star) => ({
    name: `${field.name} ${star + 1}`,
    ra: field.ra + (random.uniform() - 0.5) * 0.4,
    dec: field.dec + (random.uniform() - 0.5) * 0.4,
    V: 11 + 3 * random.uniform(),
    BV: 0.2 + random.uniform(),
  }));
}

export interface TargetNight {
  /** Public id. */
  readonly id: string;
  /** Zero of the solution's hours. */
  readonly zero: Date;
}

export interface FieldFrames {
  readonly object: string;
  readonly ra: number;
  readonly dec: number;
  /** Numbers of its frames in the log, B and V by turns from the first. */
  readonly first: number;
  readonly n: number;
  /** Hours from the zero to the first. */
  readonly begin_hours: number;
}

const exposure = 60;
const step_ms = 120_000;
const zero = new Date('2026-11-03T23:00:00Z');
const startOf = (frames: FieldFrames, index: number): number =>
  zero.getTime() + frames.begin_hours * 3_600_000 + index * step_ms;
const bandOf = (index: number): TrueBand => (index % 2 === 0 ? 'B' : 'V');

/** A night with frames of these fields, logged in this order. */
export async function targetNight(
  observer: PersonCaller,
  fields: readonly FieldFrames[],
): Promise<TargetNight> {
  const night = await openNight(observer, { telescope: 'larkspur', date: '2026-11-03' });
  for (const field of fields) {
    const inputs = Array.from({ length: field.n }, (_, index) =>
      FrameInput.parse({
        type: 'target',
        object: field.object,
        ra: field.ra,
        dec: field.dec,
        band: bandOf(index),
        utc_start: new Date(startOf(field, index)).toISOString(),
        exposure,
      }),
    );
    await logFrames(observer, night.id, inputs, { origin: 'log', isList: true });
  }
  return { id: night.id, zero };
}

/** A table as the telescope would have made it: noise, no frame scatter. */
export function targetTable(
  fields: readonly FieldFrames[],
  starsOf: (field: FieldFrames) => readonly TrueStar[],
  seed = 2,
): string {
  const random = createRandom(seed);
  const lines = ['frame,star,ra,dec,inst_mag,inst_err,peak,flag'];
  for (const field of fields) {
    for (let index = 0; index < field.n; index += 1) {
      const sky = exposureSky(site, { utcStart: startOf(field, index), exposure_s: exposure });
      const band = bandOf(index);
      for (const star of starsOf(field)) {
        const airmass = airmassAt('young1994', sky, directionOf(star.ra, star.dec));
        const offset = instrumentalOffset(truth[band], { airmass, colour: star.BV, hours: 0 });
        const err = 0.005 + 0.01 * random.uniform();
        const mag =
          star.V + (band === 'B' ? star.BV : 0) + offset + random.normal() * Math.hypot(err, scatter);
        lines.push(
          [
            field.first + index,
            star.name,
            star.ra.toFixed(7),
            star.dec.toFixed(7),
            mag.toFixed(6),
            err.toFixed(6),
            20_000,
            '',
          ].join(','),
        );
      }
    }
  }
  return `${lines.join('\n')}\n`;
}

export interface NewSolution {
  readonly state?: 'approved' | 'superseded' | 'withdrawn';
  readonly verdict?: string;
  readonly person: PersonCaller;
  /** Internal ids of the programmes that get a transformation; null for frames of none. */
  readonly programmes: readonly (number | null)[];
}

/** A solution that found the truth, as the acts of solving and approving leave it; public id. */
export async function newSolution(night: TargetNight, solution: NewSolution): Promise<string> {
  const row = await selectOne<{ id: number; number: number }>(
    `SELECT n.id, (SELECT COUNT(*) FROM solutions s WHERE s.night_id = n.id) + 1 AS number
       FROM nights n WHERE n.public_id = :id`,
    { id: night.id },
  );
  if (!row) throw new Error('There is no such night.');
  const publicId = newPublicId();
  const { state = 'approved', verdict = 'photometric', person, programmes } = solution;
  const id = await insert(
    `INSERT INTO solutions (public_id, night_id, number, state, model, inputs, software_version, outcome, verdict,
                            created_by_id, approved_by_id, solved_at, approved_at)
     VALUES (:publicId, :nightId, :number, :state, :model, :inputs, '0', 'determined', :verdict, :person, :person, NOW(3), NOW(3))`,
    {
      publicId,
      nightId: row.id,
      number: Number(row.number),
      state,
      verdict,
      person: person.personId,
      model: JSON.stringify({ airmassFormula: 'young1994' }),
      inputs: JSON.stringify({ sets: [], standardsSource: 'A test, 2026', equipmentEpoch: null }),
    },
    null,
  );
  await execute(
    'INSERT INTO solution_nights (solution_id, night_id, utc_zero) VALUES (:id, :nightId, :zero)',
    { id, nightId: row.id, zero: night.zero },
    null,
  );
  for (const band of ['B', 'V'] as const) await newBand(id, row.id, band);
  for (const programmeId of programmes) {
    await execute(
      `INSERT INTO transformations (public_id, solution_id, night_id, programme_id)
       VALUES (:transformation, :id, :nightId, :programmeId)`,
      { transformation: newPublicId(), id, nightId: row.id, programmeId },
      null,
    );
  }
  return publicId;
}

const names = [
  ['zero_point', 'zeroPoint', 0.002],
  ['extinction', 'extinction', 0.001],
  ['colour_term', 'colourTerm', 0.001],
  ['second_order_extinction', 'secondOrderExtinction', 0],
] as const;

async function newBand(solutionId: number, nightId: number, band: TrueBand): Promise<void> {
  const covariance = names.map(([, , error], i) => names.map((_, j) => (i === j ? error ** 2 : 0)));
  const bandId = await insert(
    `INSERT INTO solution_bands (solution_id, night_id, band, colour_index, outcome, covariance, correlation,
                                 scatter_observation, scatter_frame, n_used, n_rejected, n_stars, n_frames, airmass_min,
                                 airmass_max, colour_min, colour_max, utc_first, utc_last, cross_checks, warnings)
     VALUES (:solutionId, :nightId, :band, 'BV', 'determined', :covariance, '[]', :scatter, 0, 120, 3, 20, 12, 1, 2, 0, 1.4,
             '2026-11-03 20:00:00', '2026-11-04 03:00:00', '{}', '[]')`,
    { solutionId, nightId, band, covariance: JSON.stringify(covariance), scatter },
    null,
  );
  for (const [seq, [name, key, error]] of names.entries()) {
    await execute(
      `INSERT INTO solution_coefficients (solution_band_id, seq, name, status, value, error)
       VALUES (:bandId, :seq, :name, :status, :value, :error)`,
      { bandId, seq, name, status: error === 0 ? 'fixed' : 'free', value: truth[band][key], error },
      null,
    );
  }
}

/** Does the job as a runner would, without one. */
export function transform(
  payload: { readonly solution: string; readonly night: string },
  run: Partial<JobRun<'transform-targets'>> = {},
): ReturnType<typeof transformTargets> {
  return transformTargets({
    id: newPublicId(),
    payload,
    caller: { kind: 'job', jobId: 'test', personId: null, requestId: 'test' },
    attempt: 1,
    maxTries: 3,
    signal: new AbortController().signal,
    progress: () => undefined,
    ...run,
  });
}

export interface StoredStar {
  readonly programme: string | null;
  readonly star: string;
  readonly ra: number;
  readonly decl: number;
  readonly nB: number;
  readonly nV: number;
  readonly v: number;
  readonly vRandom: number;
  readonly vSystematic: number;
  readonly bv: number;
  readonly bvRandom: number;
  readonly bjd: number;
  readonly flags: number;
}

export const storedStars = (solution: string): Promise<readonly StoredStar[]> =>
  select<StoredStar>(
    `SELECT g.code AS programme, c.star, c.ra, c.decl, c.n_b AS nB, c.n_v AS nV, c.v, c.v_random AS vRandom,
            c.v_systematic AS vSystematic, c.bv, c.bv_random AS bvRandom, c.bjd_tdb AS bjd, c.flags
       FROM calibrated_magnitudes c JOIN transformations t ON t.id = c.transformation_id
       JOIN solutions s ON s.id = t.solution_id LEFT JOIN programmes g ON g.id = t.programme_id
      WHERE s.public_id = :solution ORDER BY g.code, c.star_no`,
    { solution },
  );

export const transformationStates = async (solution: string): Promise<readonly string[]> => {
  const rows = await select<{ state: string }>(
    `SELECT t.state FROM transformations t JOIN solutions s ON s.id = t.solution_id
      WHERE s.public_id = :solution ORDER BY t.id`,
    { solution },
  );
  return rows.map(({ state }) => state);
};

/** Changes the solution as its act would, in one statement. */
export const setSolutionState = (solution: string, state: string): Promise<number> =>
  execute('UPDATE solutions SET state = :state WHERE public_id = :solution', { solution, state }, null);
