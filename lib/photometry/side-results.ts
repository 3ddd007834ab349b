/**
 * Checks made beside the fit of a band of a night, with the rows that it used.
 *
 * | check | how |
 * |---|---|
 * | leave-one-star-out | each star's rows together differ from their prediction by all other stars by the shift of the mean-shift model (night-view.ts), a closed form: nothing is refitted. Root mean square over the stars |
 * | drift | the model with a drift of the zero point besides, components estimated anew; the drift of the fit itself where it is free there |
 * | runs | signs of the frames' mean residuals in time, about their median, so that a frame counts once |
 *
 * Sources: Cook and Weisberg 1982, Residuals and Influence in Regression, section 2.2; Wald and Wolfowitz 1940, Annals of
 * Mathematical Statistics 11, 147.
 */
import { median } from '@/lib/numerics/robust';
import { runsTest } from '@/lib/numerics/runs-test';
import { type BandProblem } from './band-problem';
import { type SideResults } from './band-solution';
import { crossCheck } from './cross-checks';
import { fitAlone, type NightFit } from './fit-band';
import { shiftWithin, viewNight, type NightView } from './night-view';

/** Frames that a runs test needs of each sign for its normal deviate to mean something. Common practice, no source. */
const fewestOfSign = 5;

/** Makes the checks of a night.
 * @param problem - of the band
 * @param fit - of the night
 * @returns what the fit itself does not say
 * @accuracy as the fit
 * @source see the head */
export function sideResults(problem: BandProblem, fit: NightFit): SideResults {
  const view = viewNight(problem, fit.rows, fit.components, fit.priors);
  return {
    leaveOneStarOut: view === null ? null : leaveOneStarOut(view),
    driftTest: driftTest(problem, fit),
    runsTest: view === null ? null : runsInTime(view),
    crossChecks: crossCheck(problem, fit),
  };
}

function leaveOneStarOut(view: NightView): number | null {
  const places = new Map<number, number[]>();
  for (const [i, row] of view.rows.entries()) {
    const star = view.problem.star[row]!;
    const known = places.get(star);
    if (known === undefined) places.set(star, [i]);
    else known.push(i);
  }
  const shifts = [...places.values()].flatMap((own) => {
    const { shift, error } = shiftWithin(view, own);
    return Number.isFinite(error) ? [shift] : [];
  });
  if (shifts.length === 0) return null;
  return Math.sqrt(shifts.reduce((sum, shift) => sum + shift * shift, 0) / shifts.length);
}

function driftTest(problem: BandProblem, fit: NightFit): SideResults['driftTest'] {
  const at = problem.sought.findIndex(({ name }) => name === 'drift');
  if (at >= 0) {
    const error = Math.sqrt(fit.covariance[at * problem.sought.length + at]!);
    return { value: fit.coefficients[at]!, error };
  }
  const held = problem.model.terms.drift;
  // A drift that is held at something is part of the model, and there is none to ask for besides.
  if (held?.status === 'fixed' && held.value !== 0) return null;
  const column = problem.sought.length;
  const widened: BandProblem = {
    ...problem,
    sought: [...problem.sought, { name: 'drift', term: { status: 'free' } }],
  };
  if (fit.rows.length <= widened.sought.length) return null;
  const beside = fitAlone(widened, fit.rows, { priors: fit.priors, near: fit.components });
  if (beside.kind === 'undetermined') return null;
  const [night] = beside.nights;
  if (night === undefined) return null;
  return {
    value: night.coefficients[column]!,
    error: Math.sqrt(night.covariance[column * (column + 1) + column]!),
  };
}

/** Normal deviate of the number of runs: negative where neighbours in time are alike. */
function runsInTime({ problem, rows, residuals }: NightView): number | null {
  const frames = new Map<number, { hours: number; sum: number; n: number }>();
  for (const [i, row] of rows.entries()) {
    const known = frames.get(problem.frame[row]!);
    if (known === undefined)
      frames.set(problem.frame[row]!, { hours: problem.hours[row]!, sum: residuals[i]!, n: 1 });
    else {
      known.sum += residuals[i]!;
      known.n += 1;
    }
  }
  const means = [...frames.values()].sort((a, b) => a.hours - b.hours).map(({ sum, n }) => sum / n);
  const middle = median(means);
  const { positive, negative, deviate } = runsTest(means.map((value) => value - middle));
  return positive < fewestOfSign || negative < fewestOfSign ? null : deviate;
}
