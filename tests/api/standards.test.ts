import { describe, expect, it } from 'vitest';
import { listStandards, type Standard } from '@/lib/contracts/api/standard';
import type { List } from '@/lib/contracts/common';
import { callApi, demoToken } from '../support/api';

const search = async (query: Record<string, string | number>) =>
  callApi(listStandards, { token: await demoToken('pi'), query });

describe('GET /standards', () => {
  it('gives the stars of a field with values, errors, usability and source', async () => {
    const { body } = await search({ field: 'T Phe' });
    const { items, next } = body as List<Standard>;
    expect(items).toHaveLength(11);
    expect(next).toBeNull();
    expect(items.find(({ name }) => name === 'TPhe B')).toMatchObject({
      field: 'T Phe',
      ra: 7.567971,
      dec: -46.466269,
      V: 12.334,
      BV: 0.405,
      e_V: 0.0115,
      n: 29,
      usable: true,
      source: 'Landolt 2009, AJ 137, 4186 (CDS catalogue J/AJ/137/4186)',
    });
  });

  it('gives the stars around a place, the nearest first', async () => {
    const { body } = await search({ ra: 103.05, dec: -0.32, radius: 0.05 });
    const { items } = body as List<Standard>;
    expect(items[0]?.name).toBe('98 670');
    expect(items.every(({ separation }) => (separation ?? 1) <= 0.05)).toBe(true);
  });

  it('leads through all 595 stars page by page', async () => {
    const names = new Set<string>();
    let after = '';
    do {
      const { body } = await search({ limit: 250, ...(after === '' ? {} : { after }) });
      const page = body as List<Standard>;
      page.items.forEach(({ name }) => names.add(name));
      after = page.next ?? '';
    } while (after !== '');
    expect(names.size).toBe(595);
  });

  it.each([
    [{ ra: 10, dec: 0 }, 'radius'],
    [{ ra: 400, dec: 0, radius: 1 }, 'ra'],
    [{ after: 'nonsense' }, 'after'],
  ])('refuses %j and names what is wrong', async (query, path) => {
    const { status, body } = await search(query as Record<string, string | number>);
    expect(status).toBe(400);
    expect((body as { errors: { path: string }[] }).errors.map((error) => error.path)).toContain(path);
  });

  it('is not for people who are not signed in', async () => {
    expect((await callApi(listStandards)).status).toBe(401);
  });
});
