import { describe, expect, it } from 'vitest';
import { stretchOf, withStretch } from '@/app/_components/hooks/stretch-address';

const stretch = { from: Date.parse('2026-11-03T22:40:00Z'), to: Date.parse('2026-11-03T23:25:00Z') };

describe('a selected stretch', () => {
  it('goes into the address and comes back the same', () => {
    const query = withStretch('', stretch);
    expect(query).toBe('from=2026-11-03T22:40:00Z&to=2026-11-03T23:25:00Z');
    expect(stretchOf(new URLSearchParams(query))).toEqual(stretch);
  });

  it('leaves the rest of the address as it is, also when cleared', () => {
    expect(withStretch('tab=log&from=x&to=y', stretch)).toMatch(/^tab=log&from=2026/);
    expect(withStretch(`tab=log&${withStretch('', stretch)}`, null)).toBe('tab=log');
  });

  it.each([
    '',
    'from=2026-11-03T22:40:00Z',
    'from=yesterday&to=today',
    'from=2026-11-03T23:25:00Z&to=2026-11-03T22:40:00Z',
    'from=2026-13-45T00:00Z&to=2026-13-46T00:00Z',
  ])('is nothing in the address “%s”', (query) => {
    expect(stretchOf(new URLSearchParams(query))).toBeNull();
  });
});
