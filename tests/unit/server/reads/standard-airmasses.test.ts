import { expect, it } from 'vitest';
import { airmassAt, exposureSky } from '@/lib/astro/exposure-airmass';
import { directionOf } from '@/lib/astro/vector';
import type { PublishedStar, SolveFrame, StandardColumns } from '@/lib/server/data/solve-inputs';
import { standardAirmasses } from '@/lib/server/reads/standard-airmasses';
import { expectWithin } from '@/tests/support/numbers';
import { siteOf } from '@/tests/support/sky-oracle';

const site = siteOf('north');
const utcStart = Date.UTC(2026, 10, 3, 2);
const place = { ra: 102.890542, dec: -0.192092 };
const exposure_s = 300;

const frame = (id: number, given: Partial<SolveFrame> = {}): SolveFrame => ({
  id,
  nightId: 1,
  number: id,
  band: 'V',
  utcStart: new Date(utcStart),
  utcMid: new Date(utcStart + (exposure_s / 2) * 1000),
  exposure: exposure_s,
  version: 1,
  ...given,
});

const star = (id: number, given: Partial<PublishedStar> = {}): PublishedStar => ({
  id,
  name: `Standard ${id}`,
  ...place,
  pmRa: null,
  pmDec: null,
  ...{ v: 11, bv: 0.5, ub: null, vr: null, vi: null },
  ...{ eV: 0.01, eBv: 0.01, eUb: 0.01, eVr: 0.01, eVi: 0.01 },
  citation: 'made for this test',
  ...given,
});

const rowsOf = (pairs: readonly (readonly [number, number])[]): StandardColumns => ({
  setId: pairs.map(() => 1),
  rowNo: pairs.map((_, row) => row + 1),
  frameId: pairs.map(([frameId]) => frameId),
  standardId: pairs.map(([, standardId]) => standardId),
  instMag: pairs.map(() => -7),
  instErr: pairs.map(() => 0.01),
});

const direct = (ra: number, dec: number): number =>
  airmassAt('young1994', exposureSky(site, { utcStart, exposure_s }), directionOf(ra, dec));

it('each standard on a frame has the airmass of its own place', async () => {
  const stars = [star(1), star(2, { dec: place.dec + 3 })];
  const rows = rowsOf([
    [7, 1],
    [7, 2],
  ]);
  const { airmass, why } = await standardAirmasses('young1994', site, { rows, frames: [frame(7)], stars });
  expectWithin(airmass[0] ?? NaN, direct(place.ra, place.dec), { absolute: 1e-12, unit: 'airmass' });
  expectWithin(airmass[1] ?? NaN, direct(place.ra, place.dec + 3), { absolute: 1e-12, unit: 'airmass' });
  expect(Math.abs((airmass[0] ?? NaN) - (airmass[1] ?? NaN))).toBeGreaterThan(0.01);
  expect(why.size).toBe(0);
});

it('a standard that moves has the airmass of where it stands in the night', async () => {
  // Ten arcseconds a year: four and a half minutes of arc since 2000.
  const stars = [star(1, { pmRa: 0, pmDec: 10_000 })];
  const rows = rowsOf([[7, 1]]);
  const { airmass } = await standardAirmasses('young1994', site, { rows, frames: [frame(7)], stars });
  const moved = direct(place.ra, place.dec + (26.84 * 10) / 3600);
  expectWithin(airmass[0] ?? NaN, moved, { absolute: 1e-6, unit: 'airmass' });
  expect(Math.abs(moved - direct(place.ra, place.dec))).toBeGreaterThan(1e-4);
});

it('what has no band or no airmass is left without one and told by its frame; frames not asked for are silent', async () => {
  const stars = [star(1), star(2, { ra: place.ra + 180 })];
  const rows = rowsOf([
    [7, 1],
    [7, 2],
    [8, 1],
    [9, 1],
  ]);
  const frames = [frame(7), frame(8, { band: null })];
  const { airmass, why } = await standardAirmasses('young1994', site, { rows, frames, stars });
  expect([...airmass].map(Number.isFinite)).toEqual([true, false, false, false]);
  expect([...why.keys()]).toEqual([7, 8]);
  expect(why.get(7)).toMatch(/^has no airmass \(No airmass below the horizon.*\)$/);
  expect(why.get(8)).toBe('has no band in the log');
});
