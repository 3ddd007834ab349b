import type { CreationAttributes, Sequelize } from 'sequelize';
import { starKey } from '@/lib/contracts/star-name';
import { StandardSource } from '../models/standard-source';
import { StandardStar } from '../models/standard-star';
import { readJson, readTable } from './fixture-files';

interface Source {
  readonly code: string;
  readonly citation: string;
  readonly note: string;
  readonly default_error: number;
}

type Quantity = 'V' | 'BV' | 'UB' | 'VR' | 'RI' | 'VI';
type StarLine = Readonly<
  Record<'star' | 'field' | 'ra_deg' | 'dec_deg' | 'n' | Quantity | `e_${Quantity}`, string>
>;
type MotionLine = Readonly<Record<'star' | 'pm_ra_mas_yr' | 'pm_dec_mas_yr', string>>;
type CautionLine = Readonly<Record<'star' | 'is_usable' | 'caution', string>>;

/** An empty cell is a value that was not published. */
const number = (text: string | undefined): number | null =>
  text === undefined || text === '' ? null : Number(text);

const byStar = <Line extends { readonly star: string }>(lines: readonly Line[]): ReadonlyMap<string, Line> =>
  new Map(lines.map((line) => [line.star, line]));

async function readStars(sourceId: number): Promise<readonly CreationAttributes<StandardStar>[]> {
  const lines = await readTable<keyof StarLine>('standards/landolt-2009.csv');
  const motions = byStar(await readTable<keyof MotionLine>('standards/landolt-2009-proper-motions.csv'));
  const cautions = byStar(await readTable<keyof CautionLine>('standards/cautions.csv'));
  return lines.map((line) => ({
    sourceId,
    name: line.star,
    nameKey: starKey(line.star),
    field: line.field,
    ra: Number(line.ra_deg),
    decl: Number(line.dec_deg),
    pmRa: number(motions.get(line.star)?.pm_ra_mas_yr),
    pmDec: number(motions.get(line.star)?.pm_dec_mas_yr),
    v: Number(line.V),
    bv: Number(line.BV),
    ub: number(line.UB),
    vr: number(line.VR),
    ri: number(line.RI),
    vi: number(line.VI),
    eV: number(line.e_V),
    eBv: number(line.e_BV),
    eUb: number(line.e_UB),
    eVr: number(line.e_VR),
    eRi: number(line.e_RI),
    eVi: number(line.e_VI),
    nObservations: number(line.n),
    isUsable: cautions.get(line.star)?.is_usable !== '0',
    caution: cautions.get(line.star)?.caution ?? '',
  }));
}

/**
 * Loads the published standard stars with their source, or brings rows that are there up to the fixtures. Stars keep
 * their ids, which solutions refer to. Returns the number of stars.
 */
export async function seedReference(sequelize: Sequelize): Promise<number> {
  const source = await readJson<Source>('standards/source.json');
  return sequelize.transaction(async (transaction) => {
    const values = { citation: source.citation, note: source.note, defaultError: source.default_error };
    const [row] = await StandardSource.findOrCreate({
      where: { code: source.code },
      defaults: { code: source.code, ...values },
      transaction,
    });
    await row.update(values, { transaction });
    const stars = await readStars(row.id);
    const keys = Object.keys(StandardStar.getAttributes()) as (keyof CreationAttributes<StandardStar>)[];
    await StandardStar.bulkCreate(stars, {
      updateOnDuplicate: keys.filter((key) => key !== 'id' && key !== 'nameKey'),
      transaction,
    });
    return stars.length;
  });
}
