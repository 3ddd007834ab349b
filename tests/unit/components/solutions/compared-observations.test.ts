import { describe, expect, it } from 'vitest';
import { differences } from '../../../../app/(desk)/solutions/[id]/compare/_components/compared-observations';
import { observation } from './observation';

describe('observations of two solutions', () => {
  it('differ where only one used them, or only one was given them, in order of time', () => {
    const same = observation();
    const rejected = observation({ utc_mid: '2026-11-04T01:00:00.000Z' });
    const onlyInOther = observation({ utc_mid: '2026-11-03T20:00:00.000Z' });
    const unusedInOther = observation({ used: false });
    const found = differences(
      [same, rejected],
      [same, { ...rejected, used: false, reason: 'cloud' }, onlyInOther, unusedInOther],
    );
    expect(found.map(({ id }) => id)).toEqual([onlyInOther.observation, rejected.observation]);
    expect(found[0]?.one).toBeNull();
    expect(found[1]?.other?.reason).toBe('cloud');
  });
});
