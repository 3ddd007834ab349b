import { FrameInput } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { starKey } from '@/lib/contracts/star-name';
import { SolveOptions } from '@/lib/contracts/solve-options';
import { closeNight } from '@/lib/server/acts/close-night';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import { queueSolve } from '@/lib/server/acts/queue-solve';
import { insert, select, selectOne } from '@/lib/server/data/database';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { solveNight } from '@/workers/handlers/solve-night';
import type { JobRun } from '@/workers/handler';
import { system } from './jobs';
import { check, upload } from './measurements';

/** Colours of a field's stars: a range that determines a colour term. */
const colours = [-0.1, 0.1, 0.3, 0.5, 0.7, 0.9, 1.2, 1.5];

/** Eight stars of a field that is high in the evening and low after midnight. */
export async function newField(): Promise<void> {
  const source = await insert(
    `INSERT INTO standard_sources (code, citation, note, default_error) VALUES ('field', 'A field of tests', '', 0.004)`,
    {},
    null,
  );
  for (const [place, bv] of colours.entries()) {
    const name = `Q ${place + 1}`;
    await insert(
      `INSERT INTO standard_stars (source_id, name, name_key, field, ra, decl, v, bv, ub, vr, ri)
       VALUES (:source, :name, :key, 'Q', :ra, 28, :v, :bv, 0.1, 0.3, 0.3)`,
      { source, name, key: starKey(name), ra: 10 + 0.01 * place, v: 12 + 0.2 * place, bv },
      null,
    );
  }
}

/** Truth of the simulated measurements, in V and in B. */
export const truth = {
  V: { zeroPoint: -20.1, extinction: 0.14, colourTerm: -0.04 },
  B: { zeroPoint: -19.8, extinction: 0.25, colourTerm: 0.09 },
} as const;

interface NightOptions {
  readonly date: string;
  readonly hours?: readonly number[];
  readonly isClosed?: boolean;
  /** Rows of a programme's target beside the standards, on frames of their own. */
  readonly targets?: readonly string[];
}

/** Small, and the same at every run. */
const noise = (place: number): number => 0.004 * Math.sin(12.9898 * (place + 1) * (place + 7));

/**
 * A night with the field measured in V and B at each hour after 18 h UTC, its table uploaded and matched. Airmass is what
 * the log says, so the fit finds the truth again.
 */
export async function solvableNight(
  observer: PersonCaller,
  { date, hours = [2, 4, 6, 8, 9, 10], isClosed = true, targets = [] }: NightOptions,
): Promise<{ readonly night: Night; readonly set: string }> {
  const night = await openNight(observer, { telescope: 'larkspur', date });
  const start = Date.parse(`${date}T18:00:00Z`);
  const utc = (hour: number, minute: number): string =>
    new Date(start + (hour * 60 + minute) * 60_000).toISOString();
  const standard = hours.flatMap((hour) =>
    (['V', 'B'] as const).map((band, place) =>
      FrameInput.parse({
        type: 'standard',
        object: 'Q',
        ra: 10.03,
        dec: 28,
        band,
        utc_start: utc(hour, 5 * place),
        exposure: 40,
      }),
    ),
  );
  const target = targets.map((object, place) =>
    FrameInput.parse({ type: 'target', object, band: 'V', utc_start: utc(5, 10 * place), exposure: 60 }),
  );
  await logFrames(observer, night.id, [...standard, ...target], { origin: 'log', isList: true });
  const { set } = await upload(observer, night.id, await standardTable(night.id), { kind: 'standard' });
  await check({ set });
  if (targets.length > 0) {
    const rows = targets.map((_, place) => `${standard.length + place + 1},star ${place},-7,0.01`);
    const uploaded = await upload(observer, night.id, `frame,star,inst_mag,inst_err\n${rows.join('\n')}\n`, {
      kind: 'target',
    });
    await check(uploaded);
  }
  if (isClosed) await closeNight(observer, night.id, {});
  return { night, set };
}

/** What was measured: the truth at the airmass that the log gives each frame. */
export async function standardTable(nightId: string, shift = 0): Promise<string> {
  const frames = await standardFrames(nightId);
  const rows = frames.flatMap(({ number, band, airmass }) =>
    colours.map((bv, place) => {
      const { zeroPoint, extinction, colourTerm } = truth[band];
      const secondOrder = band === 'B' ? -0.03 : 0;
      const standard = 12 + 0.2 * place + (band === 'B' ? bv : 0);
      const offset = zeroPoint + extinction * airmass + colourTerm * bv + secondOrder * airmass * bv;
      const measured = standard + offset + shift + noise(number * 8 + place);
      return `${number},Q ${place + 1},${measured.toFixed(5)},0.004`;
    }),
  );
  return `frame,star,inst_mag,inst_err\n${rows.join('\n')}\n`;
}

interface StandardFrame {
  readonly number: number;
  readonly band: 'V' | 'B';
  readonly airmass: number;
}

async function standardFrames(nightId: string): Promise<readonly StandardFrame[]> {
  return select<StandardFrame>(
    `SELECT f.number, f.band, f.airmass FROM frames f JOIN nights n ON n.id = f.night_id
      WHERE n.public_id = :nightId AND f.type = 'standard' ORDER BY f.number`,
    { nightId },
  );
}

/** Does the solve of a solution as a runner would, without one. */
export function solve(
  solution: string,
  run: Partial<JobRun<'solve-night'>> = {},
): ReturnType<typeof solveNight> {
  return solveNight({
    id: `test-${solution}`,
    payload: { solution },
    caller: system,
    attempt: 1,
    maxTries: 3,
    signal: new AbortController().signal,
    progress: () => undefined,
    ...run,
  });
}

/** A solved draft of the night. */
export async function solvedDraft(
  caller: PersonCaller,
  nightId: string,
  options: Record<string, unknown> = {},
): Promise<string> {
  const { solution } = await queueSolve(caller, nightId, SolveOptions.parse(options));
  await solve(solution);
  return solution;
}

export interface SolutionNow {
  readonly id: number;
  readonly state: string;
  readonly outcome: string | null;
  readonly verdict: string | null;
  readonly number: number;
  readonly hash: string | null;
  readonly observations: number;
  readonly bands: number;
  readonly nightState: string;
}

export async function solutionNow(publicId: string): Promise<SolutionNow> {
  const row = await selectOne<SolutionNow>(
    `SELECT s.id, s.state, s.outcome, s.verdict, s.number, s.input_hash AS hash, n.state AS nightState,
            (SELECT COUNT(*) FROM solution_observations o WHERE o.solution_id = s.id) AS observations,
            (SELECT COUNT(*) FROM solution_bands b WHERE b.solution_id = s.id) AS bands
       FROM solutions s JOIN nights n ON n.id = s.night_id WHERE s.public_id = :publicId`,
    { publicId },
  );
  if (!row) throw new Error(`There is no solution ${publicId}.`);
  return row;
}
