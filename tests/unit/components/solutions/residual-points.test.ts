import { describe, expect, it } from 'vitest';
import { axisAbout, timeAxisAbout } from '@/app/_components/charts/axis-ticks';
import {
  residualAxis,
  residualPlot,
  thinned,
  tickWords,
} from '../../../../app/(desk)/solutions/[id]/_components/residual-points';
import { observation } from './observation';

describe('an axis', () => {
  it('has round ends about the values and round steps', () => {
    expect(axisAbout(1.04, 2.11)).toEqual({
      min: 1,
      max: 2.2,
      ticks: [1, 1.2, 1.4, 1.6, 1.8, 2, 2.2],
      decimals: 1,
    });
  });

  it('has room about a single value', () => {
    const { min, max } = axisAbout(0, 0);
    expect(min).toBeLessThanOrEqual(0);
    expect(max).toBeGreaterThan(0);
  });

  it('of time has its ticks on full hours, over midnight too', () => {
    const { ticks } = timeAxisAbout(Date.parse('2026-11-03T19:24:00Z'), Date.parse('2026-11-04T05:12:00Z'));
    expect(ticks.map((utc) => new Date(utc).toISOString().slice(11, 16))).toEqual([
      '18:00',
      '20:00',
      '22:00',
      '00:00',
      '02:00',
      '04:00',
      '06:00',
    ]);
  });
});

describe('the plot of residuals', () => {
  it('keeps a gross outlier from flattening the rest: it is drawn at the end of the axis and counted', () => {
    const used = [0.012, -0.02, 0.008].map((residual) => observation({ residual }));
    const gross = observation({ residual: 0.214, used: false });
    const plot = residualPlot([...used, gross], 'airmass', residualAxis([...used, gross]));
    expect(plot.y.max).toBeLessThan(0.08);
    expect(plot.points.at(-1)).toMatchObject({ y: plot.y.max, isBeyond: true, isUsed: false });
    expect(plot.nBeyond).toBe(1);
  });

  it('is set by most of the residuals, not by one faint star that is used', () => {
    const rows = Array.from({ length: 99 }, (_, i) => observation({ residual: ((i % 11) - 5) / 500 }));
    const faint = observation({ residual: -0.39 });
    const plot = residualPlot([...rows, faint], 'airmass', residualAxis([...rows, faint]));
    expect(plot.y.max).toBeLessThanOrEqual(0.03);
    expect(plot.points.at(-1)).toMatchObject({ y: plot.y.min, isBeyond: true, isUsed: true });
    expect(plot.nBeyond).toBe(1);
  });

  it('reaches to what was rejected not far off, and to all where nothing was used', () => {
    const used = Array.from({ length: 20 }, () => observation({ residual: 0.02 }));
    const rejected = [0.06, 0.3].map((residual) => observation({ residual, used: false }));
    expect(residualAxis([...used, ...rejected]).max).toBeGreaterThan(0.06);
    expect(residualAxis([...used, ...rejected]).max).toBeLessThan(0.1);
    expect(residualAxis(rejected).max).toBeGreaterThan(0.3);
  });

  it('leaves out what has no residual or no colour', () => {
    const rows = [observation({ residual: null }), observation({ colour: null }), observation()];
    expect(residualPlot(rows, 'colour', residualAxis(rows)).points).toHaveLength(1);
    expect(residualPlot(rows, 'airmass', residualAxis(rows)).points).toHaveLength(2);
  });

  it('writes times at the ticks of UTC and figures at the others', () => {
    const rows = [observation(), observation({ utc_mid: '2026-11-04T02:40:00.000Z' })];
    const utc = residualPlot(rows, 'utc', residualAxis(rows));
    expect(tickWords(utc, Date.parse('2026-11-03T22:00:00Z'))).toBe('22:00');
    expect(tickWords(residualPlot(rows, 'airmass', residualAxis(rows)), 1.4)).toMatch(/^1\.4/);
  });

  it('is thinned to so many points, and loses neither a rejected one nor the largest residual', () => {
    const rows = Array.from({ length: 12_000 }, (_, i) =>
      observation({ residual: i === 7001 ? 0.9 : ((i * 7919) % 101) / 5000, used: i % 400 !== 0 }),
    );
    const kept = thinned(rows, 5000);
    expect(kept.length).toBeLessThanOrEqual(5000);
    expect(kept.length).toBeGreaterThan(4500);
    expect(kept.filter(({ used }) => !used)).toHaveLength(30);
    expect(kept).toContain(rows[7001]);
  });
});
