import { describe, expect, it } from 'vitest';
import {
  formatClock,
  formatDateInWords,
  formatDuration,
  formatInstant,
  formatLocalMinutes,
  formatMinutes,
  formatMonthInWords,
} from '@/app/_components/ui/format-time';

describe('a time', () => {
  it('is UTC by the clock, rounded and not cut', () => {
    expect(formatClock('2026-11-03T23:41:06.600Z')).toBe('23:41:07');
    expect(formatMinutes('2026-11-03T23:59:31Z')).toBe('00:00');
    expect(formatInstant('2026-11-03T23:41:07Z')).toBe('2026-11-03 23:41 UTC');
  });

  it('at a place follows its zone, summer time included', () => {
    expect(formatLocalMinutes('2026-11-03T23:41:00Z', 'Atlantic/Canary')).toBe('23:41');
    expect(formatLocalMinutes('2026-07-03T23:41:00Z', 'Atlantic/Canary')).toBe('00:41');
  });

  it('reads as words where it names a night', () => {
    expect(formatDateInWords('2026-11-03')).toBe('3 November 2026');
    expect(formatMonthInWords('2026-11')).toBe('November 2026');
  });

  it.each([
    [18, '0 h 18 min'],
    [61, '1 h 01 min'],
    [0, '0 h 00 min'],
  ])('lost, of %s minutes, is %s', (minutes, text) => {
    expect(formatDuration(minutes)).toBe(text);
  });
});
