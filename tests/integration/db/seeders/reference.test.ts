import { beforeAll, describe, expect, it } from 'vitest';
import { database } from '@/db/connection';
import { StandardSource } from '@/db/models/standard-source';
import { StandardStar } from '@/db/models/standard-star';
import { seedReference } from '@/db/seeders/reference';
import { emptyTables } from '@/tests/support/database';

const star = async (name: string): Promise<StandardStar> =>
  StandardStar.findOne({ where: { name }, rejectOnEmpty: true });

describe('reference data', () => {
  beforeAll(async () => {
    await emptyTables();
    await seedReference(database());
  });

  it('hold the 595 published standards, each with its source', async () => {
    const source = await StandardSource.findOne({ rejectOnEmpty: true });
    expect(source.citation).toContain('Landolt 2009, AJ 137, 4186');
    expect(source.citation).toContain('J/AJ/137/4186');
    expect(source.defaultError).toBe(0.003);
    expect(source.note).toContain('0.003 mag');
    expect(await StandardStar.count({ where: { sourceId: source.id } })).toBe(595);
  });

  it('keep the published values and leave out what was not published', async () => {
    expect((await star('TPhe I')).get()).toMatchObject({
      nameKey: 'tphei',
      field: 'T Phe',
      ra: 7.519138,
      decl: -46.469492,
      pmRa: 13.6,
      pmDec: -8.5,
      v: 14.82,
      bv: 0.764,
      vi: 0.817,
      eV: 0.0026,
      nObservations: 25,
      isUsable: true,
      caution: '',
    });
    expect((await star('HD 2892')).get()).toMatchObject({
      vi: null,
      eV: null,
      eBv: null,
      nObservations: null,
    });
  });

  it('mark the star whose published position belongs to another one as not to be used', async () => {
    const { isUsable, caution } = await star('G163 51E');
    expect(isUsable).toBe(false);
    expect(caution).toContain('belongs to another star');
    expect(await StandardStar.count({ where: { isUsable: false } })).toBe(1);
  });

  it('warn of a doubtful colour without forbidding the star', async () => {
    const { isUsable, caution } = await star('92 259');
    expect(isUsable).toBe(true);
    expect(caution).toContain('R−I');
  });

  it('can be loaded again: the same stars, with the same ids, brought up to the published values', async () => {
    const before = await star('92 259');
    await before.update({ v: 1, caution: '', isUsable: false });
    await seedReference(database());
    const after = await star('92 259');
    expect(await StandardStar.count()).toBe(595);
    expect(await StandardSource.count()).toBe(1);
    expect(after.id).toBe(before.id);
    expect(after.v).toBe(14.997);
    expect(after.isUsable).toBe(true);
  });
});
