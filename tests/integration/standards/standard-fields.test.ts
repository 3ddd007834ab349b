import { beforeAll, describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { seedReference } from '@/db/seeders/reference';
import { standardField } from '@/lib/server/reads/standard-field';
import { standardFields } from '@/lib/server/reads/standard-fields';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { expectWithin } from '@/tests/support/numbers';

/** In the night of 3 November 2026 at Marrow Hill. */
const now = Date.parse('2026-11-03T23:00:00Z');
let caller: PersonCaller;

describe('standard fields', () => {
  beforeAll(async () => {
    await seedReference(database());
    caller = await newCaller('Wren Achterberg');
  });

  it('are there before any telescope is, without an airmass for tonight', async () => {
    const list = await standardFields(caller, { now });
    expect(list).toMatchObject({ telescope: null, night: null, telescopes: [] });
    expect(list.fields).toHaveLength(98);
    expect(list.fields.every(({ tonight }) => tonight === null)).toBe(true);
    expect(list.sources).toHaveLength(1);
  });

  describe('with a telescope', () => {
    beforeAll(async () => {
      await newLogWorld();
    });

    it('tell how many stars they have, how many may be used, and their ranges', async () => {
      const { fields } = await standardFields(caller, { now });
      expect(fields.reduce((sum, { nStars }) => sum + nStars, 0)).toBe(595);
      expect(fields.find(({ name }) => name === 'G163-50/51')).toMatchObject({
        nStars: 7,
        nUsable: 6,
        V: [11.292, 14.466],
        BV: [0.036, 1.499],
      });
      expect(fields.map(({ ra }) => ra)).toEqual(fields.map(({ ra }) => ra).toSorted((a, b) => a - b));
    });

    it('tell when they are best in the dark hours of the night, at the telescope asked for', async () => {
      const { fields, telescope, night } = await standardFields(caller, { now, telescope: 'larkspur' });
      expect(telescope?.code).toBe('larkspur');
      expect(night?.date).toBe('2026-11-03');
      const sa95 = fields.find(({ name }) => name === 'SA 95')?.tonight;
      expectWithin(sa95?.airmass ?? Number.NaN, 1.132, { absolute: 0.003, unit: 'airmass' });
      expectWithin(sa95?.utc ?? Number.NaN, Date.parse('2026-11-04T02:15:00Z'), {
        absolute: 600_000,
        unit: 'ms',
      });
      expect(fields.find(({ name }) => name === 'SA 105')?.tonight).toBeNull();
    });

    it('before noon it is still last night, and a code that is not there means the first telescope', async () => {
      const { night, telescope } = await standardFields(caller, {
        now: Date.parse('2026-11-04T11:30:00Z'),
        telescope: 'no-such-telescope',
      });
      expect(night?.date).toBe('2026-11-03');
      expect(telescope?.code).toBe('larkspur');
    });

    it('each has an address of its own, which needs no escapes and leads to it', async () => {
      const { fields } = await standardFields(caller, { now });
      const slugs = fields.map(({ slug }) => slug);
      expect(new Set(slugs).size).toBe(slugs.length);
      for (const { slug, name, nStars } of fields) {
        expect(encodeURI(slug)).toBe(slug);
        const page = await standardField(caller, slug, { now });
        expect(page?.field.name).toBe(name);
        expect(page?.stars).toHaveLength(nStars);
      }
      expect(await standardField(caller, 'no-such-field', { now })).toBeNull();
    });

    it('charts have east at larger right ascension and north at larger declination', async () => {
      const page = await standardField(caller, 'sa98', { now });
      const stars = page?.stars ?? [];
      const order = (key: 'ra' | 'east' | 'dec' | 'north') =>
        [...stars].sort((a, b) => a[key] - b[key]).map(({ name }) => name);
      expect(order('east')).toEqual(order('ra'));
      expect(order('north')).toEqual(order('dec'));
      expect(Math.max(...stars.map(({ east, north }) => Math.hypot(east, north)))).toBeLessThan(0.4);
    });
  });
});
