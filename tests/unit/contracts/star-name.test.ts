import { describe, expect, it } from 'vitest';
import { starKey } from '@/lib/contracts/star-name';

describe('starKey', () => {
  it.each([
    ['SA 92-259', 'sa92259'],
    ['sa92 259', 'sa92259'],
    ['  PG0029+024 ', 'pg0029+024'],
    ['BD -15 115', 'bd15115'],
    ['BD \u221215\u00a0115', 'bd15115'],
    ['G163\u201351E', 'g16351e'],
    ['T\tPhe', 'tphe'],
    ['', ''],
  ])('the key of %j is %j', (name, key) => {
    expect(starKey(name)).toBe(key);
  });

  it('a plus sign is part of the name, so that PG0029+024 and PG0029-024 stay two stars', () => {
    expect(starKey('PG0029+024')).not.toBe(starKey('PG0029-024'));
  });
});
