import { describe, expect, it } from 'vitest';
import { bandProblem } from '@/lib/photometry/band-problem';
import { usualBandModel } from '@/lib/photometry/fit-model';
import {
  deletionOf,
  frameShifts,
  predictionOf,
  shiftOfGroup,
  shiftWithin,
  viewNight,
  type NightView,
} from '@/lib/photometry/night-view';
import { expectWithin } from '@/tests/support/numbers';
import { standardNight } from '@/tests/support/standard-night';

const { observations } = standardNight({ seed: 41, frames: 15, starsPerFrame: 6, fields: 4 });
const { problem } = bandProblem(observations, usualBandModel('V'));
const components = { observation: 0.006 ** 2, block: 0.005 ** 2 };
const all = problem.observation.map((_, row) => row);

function viewOf(rows: Int32Array): NightView {
  const view = viewNight(problem, rows, components, []);
  if (view === null) throw new Error('The night is determined.');
  return view;
}

const close = (unit: string) => ({ absolute: 1e-10, unit });

describe('a night seen at given scatters', () => {
  const view = viewOf(all);

  it('every frame has the shift that its rows have as a group, whichever way it is asked', () => {
    const shifts = frameShifts(view);
    expect(shifts.size).toBe(15);
    for (const [frame, { shift, error }] of shifts) {
      const rows = all.filter((row) => problem.frame[row] === frame);
      const within = shiftWithin(view, [...rows]);
      expectWithin(shift, within.shift, close('mag'));
      expectWithin(error, within.error, close('mag'));
      const refitted = shiftOfGroup(view, rows);
      expectWithin(shift, refitted?.shift ?? NaN, close('mag'));
      expectWithin(error, refitted?.error ?? NaN, close('mag'));
    }
  });

  it('a row in the fit differs by what it differs from its prediction by a fit without it', () => {
    for (const row of all.filter((_, i) => i % 5 === 0)) {
      const deleted = deletionOf(view, row);
      const predicted = predictionOf(viewOf(all.filter((other) => other !== row)), row);
      expectWithin(deleted.shift, predicted.shift, close('mag'));
      expectWithin(deleted.error, predicted.error, close('mag'));
    }
  });

  it('rows that alone determine a coefficient differ from nothing', () => {
    // Two airmasses, of which one frame alone has the second.
    const [lone = NaN] = problem.frame;
    const low = all.filter((row) => problem.frame[row] !== lone);
    const flat = { ...problem, airmass: problem.airmass.map((_, row) => (low.includes(row) ? 1.2 : 1.8)) };
    const seen = viewNight(flat, all, components, []);
    if (seen === null) throw new Error('The night is determined.');
    expect(frameShifts(seen).get(lone)).toEqual({ shift: 0, error: Infinity });
  });
});
