import { describe, expect, it } from 'vitest';
import {
  listed,
  plotted,
  selectionWords,
  sorted,
  toggled,
  widened,
} from '../../../../app/(desk)/solutions/[id]/_components/observation-list';
import { observation } from './observation';

const misnamed = observation({ star: '114-670', frame: 22, residual: 0.214, used: false });
const misnamedInB = observation({ star: '114-670', frame: 23, band: 'B', residual: 0.231, used: false });
const other = observation({ star: '114-750', frame: 22, residual: -0.018 });
const later = observation({ star: '95-41', frame: 24, residual: null, night_date: '2026-11-04' });
const all = [misnamed, misnamedInB, other, later];
const of = (...observations: readonly (typeof other)[]) =>
  new Set(observations.map(({ observation: id }) => id));

describe('the list of observations', () => {
  it('is sorted by a column both ways, with what has no value at the end of each', () => {
    expect(sorted(all, { key: 'residual', descends: false })).toEqual([other, misnamed, misnamedInB, later]);
    expect(sorted(all, { key: 'residual', descends: true })).toEqual([misnamedInB, misnamed, other, later]);
  });

  it('sorts names of stars as people count: 95-41 before 114-670', () => {
    expect(sorted(all, { key: 'star', descends: false }).map(({ star }) => star)).toEqual([
      '95-41',
      '114-670',
      '114-670',
      '114-750',
    ]);
  });

  it('is narrowed by band, by night, to the rejected and to the selected', () => {
    expect(plotted(all, { band: 'B', night: null })).toEqual([misnamedInB]);
    expect(plotted(all, { band: null, night: '2026-11-04' })).toEqual([later]);
    expect(listed(all, 'rejected', of())).toEqual([misnamed, misnamedInB]);
    expect(listed(all, 'selected', of(other))).toEqual([other]);
  });

  it('selects all of a star, or all of a frame, from one of its observations', () => {
    expect(widened(all, of(misnamed), 'star')).toEqual(of(misnamed, misnamedInB));
    expect(widened(all, of(misnamed), 'frame')).toEqual(of(misnamed, other));
  });

  it('takes an observation out of the selection where it was in', () => {
    expect(toggled(of(other), misnamed.observation)).toEqual(of(other, misnamed));
    expect(toggled(of(other), other.observation)).toEqual(of());
  });

  it('says what is selected by star and frame', () => {
    expect(selectionWords(all, of(misnamed, misnamedInB))).toBe('2 selected: star 114-670, frames 22, 23');
    expect(selectionWords(all, of())).toBe('none selected');
  });
});
