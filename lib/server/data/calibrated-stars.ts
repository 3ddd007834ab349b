import 'server-only';
import {
  bitOfNight,
  calibratedOrder,
  type CalibratedPageQuery,
  type CalibratedSort,
  type DiagramStar,
} from '@/lib/contracts/calibrated-page';
import { select, selectOne, type SqlValues } from './database';

/** A row as it is stored, under the names of the interface; the total errors are the reader's to make. */
export interface StarRow {
  readonly no: number;
  readonly star: string;
  readonly ra: number | null;
  readonly dec: number | null;
  readonly n_U: number;
  readonly n_B: number;
  readonly n_V: number;
  readonly n_R: number;
  readonly n_I: number;
  readonly V: number | null;
  readonly V_random: number | null;
  readonly V_systematic: number | null;
  readonly B: number | null;
  readonly B_random: number | null;
  readonly B_systematic: number | null;
  readonly BV: number | null;
  readonly BV_random: number | null;
  readonly BV_systematic: number | null;
  readonly UB: number | null;
  readonly UB_random: number | null;
  readonly UB_systematic: number | null;
  readonly VR: number | null;
  readonly VR_random: number | null;
  readonly VR_systematic: number | null;
  readonly VI: number | null;
  readonly VI_random: number | null;
  readonly VI_systematic: number | null;
  readonly bjd_tdb: number | null;
  readonly airmass: number | null;
  readonly flags: number;
}

const quantities = ['V', 'B', 'BV', 'UB', 'VR', 'VI']
  .flatMap((name) => [name, `${name}_random`, `${name}_systematic`])
  .map((name) => `c.${name.toLowerCase()} AS ${name}`)
  .join(', ');
const columns = `c.star_no AS no, c.star, c.ra, c.decl AS \`dec\`, c.n_u AS n_U, c.n_b AS n_B, c.n_v AS n_V,
  c.n_r AS n_R, c.n_i AS n_I, ${quantities}, c.bjd_tdb, c.airmass, c.flags`;
const table = 'calibrated_magnitudes c';

const totalOf = (name: string) =>
  `(c.${name}_random * c.${name}_random + c.${name}_systematic * c.${name}_systematic)`;
const sortKeys: Readonly<Record<CalibratedSort, string>> = {
  // 2 before 10.
  star: 'NATURAL_SORT_KEY(c.star)',
  ra: 'c.ra',
  V: 'c.v',
  V_total: totalOf('v'),
  BV: 'c.bv',
  BV_total: totalOf('bv'),
  B: 'c.b',
  UB: 'c.ub',
  VR: 'c.vr',
  VI: 'c.vi',
  n_V: 'c.n_v',
  airmass: 'c.airmass',
};

/** What has no value stands last, whichever way the list runs; equals keep the order of the table. */
function orderOf(query: CalibratedPageQuery): string {
  const { sort, descending } = calibratedOrder(query);
  const key = sortKeys[sort];
  return `${noValueOf(sort, query)}, ${key} ${descending ? 'DESC' : 'ASC'}, c.star_no`;
}

/** By V there is an index, except where it would lead row by row through a whole result to the few that are sought. */
function noValueOf(sort: CalibratedSort, { star, bv_from, bv_to }: CalibratedPageQuery): string {
  const isSearch = star !== undefined || bv_from !== undefined || bv_to !== undefined;
  return sort === 'V' && !isSearch ? 'c.no_v' : `${sortKeys[sort]} IS NULL`;
}

const isClean = `(c.flags | ${bitOfNight}) = ${bitOfNight}`;

interface Narrowed {
  readonly where: string;
  readonly values: SqlValues;
}

function narrowed(transformation: number, query: CalibratedPageQuery): Narrowed {
  const conditions = [
    'c.transformation_id = :transformation',
    query.star === undefined ? '' : 'INSTR(c.star, :star) > 0',
    query.v_from === undefined ? '' : 'c.v >= :vFrom',
    query.v_to === undefined ? '' : 'c.v <= :vTo',
    query.bv_from === undefined ? '' : 'c.bv >= :bvFrom',
    query.bv_to === undefined ? '' : 'c.bv <= :bvTo',
    query.clean === true ? isClean : '',
  ];
  return {
    where: conditions.filter((sql) => sql !== '').join(' AND '),
    values: {
      transformation,
      star: query.star ?? null,
      vFrom: query.v_from ?? null,
      vTo: query.v_to ?? null,
      bvFrom: query.bv_from ?? null,
      bvTo: query.bv_to ?? null,
    },
  };
}

export interface StarSummary {
  readonly nStars: number;
  readonly nClean: number;
  readonly has: { readonly B: boolean; readonly UB: boolean; readonly VR: boolean; readonly VI: boolean };
  /** How many stars carry each of the flags that were asked for, in their order. */
  readonly nFlagged: readonly number[];
}

/**
 * What there is in a whole result, whatever the list is narrowed to. `bits` are places of flags. Only for results that
 * the caller may see.
 */
export async function starSummary(transformation: number, bits: readonly number[]): Promise<StarSummary> {
  const perBit = bits.map((bit) => `COUNT(IF(c.flags & ${1 << bit}, 1, NULL)) AS bit${bit}`);
  const row = await selectOne<Readonly<Record<string, number>>>(
    `SELECT COUNT(*) AS nStars, COUNT(IF(${isClean}, 1, NULL)) AS nClean, COUNT(c.b) AS nB, COUNT(c.ub) AS nUB,
            COUNT(c.vr) AS nVR, COUNT(c.vi) AS nVI, ${perBit.join(', ')}
       FROM ${table} WHERE c.transformation_id = :transformation`,
    { transformation },
  );
  const count = (name: string): number => Number(row?.[name] ?? 0);
  return {
    nStars: count('nStars'),
    nClean: count('nClean'),
    has: { B: count('nB') > 0, UB: count('nUB') > 0, VR: count('nVR') > 0, VI: count('nVI') > 0 },
    nFlagged: bits.map((bit) => count(`bit${bit}`)),
  };
}

export interface StarCounts {
  readonly nShown: number;
  /** Of those, with both V and B−V. */
  readonly nDiagram: number;
}

/** How many stars of a result the query lets through. */
export async function countStars(transformation: number, query: CalibratedPageQuery): Promise<StarCounts> {
  const { where, values } = narrowed(transformation, query);
  const row = await selectOne<StarCounts>(
    `SELECT COUNT(*) AS nShown, COUNT(c.v + c.bv) AS nDiagram FROM ${table} WHERE ${where}`,
    values,
  );
  return { nShown: Number(row?.nShown ?? 0), nDiagram: Number(row?.nDiagram ?? 0) };
}

interface Part {
  readonly offset: number;
  readonly limit: number;
}

/**
 * Part of the list of a result's stars. Numbers alone are sorted, and whole rows read of the part only: in that order,
 * whatever the optimiser thinks of it.
 */
export function listStars(
  transformation: number,
  query: CalibratedPageQuery,
  part: Part,
): Promise<readonly StarRow[]> {
  const { where, values } = narrowed(transformation, query);
  const order = orderOf(query);
  return select<StarRow>(
    `SELECT STRAIGHT_JOIN ${columns}
       FROM (SELECT c.star_no FROM ${table} WHERE ${where} ORDER BY ${order} LIMIT :limit OFFSET :offset) q
       JOIN ${table} ON c.transformation_id = :transformation AND c.star_no = q.star_no
      ORDER BY ${order}`,
    { ...values, ...part },
  );
}

/** Where in the list a star stands, from 0; null when the query does not let it through. */
export async function placeOfStar(
  transformation: number,
  query: CalibratedPageQuery,
  no: number,
): Promise<number | null> {
  const { where, values } = narrowed(transformation, query);
  const row = await selectOne<{ place: number }>(
    `SELECT q.place FROM (SELECT c.star_no, ROW_NUMBER() OVER (ORDER BY ${orderOf(query)}) AS place
        FROM ${table} WHERE ${where}) q WHERE q.star_no = :no`,
    { ...values, no },
  );
  return row && Number(row.place) - 1;
}

interface Thinning {
  /** Every so manieth star. */
  readonly step: number;
  /** A star that is there in any case. */
  readonly at: number | undefined;
}

/** Stars of the list that have V and B−V, evenly thinned; as in `listStars`, numbers come first. */
export async function diagramStars(
  transformation: number,
  query: CalibratedPageQuery,
  { step, at }: Thinning,
): Promise<readonly DiagramStar[]> {
  const { where, values } = narrowed(transformation, query);
  const rows = await select<Omit<DiagramStar, 'hasCautions'> & { flags: number }>(
    `SELECT STRAIGHT_JOIN c.star_no AS no, c.star, c.v AS V, c.bv AS BV, c.flags
       FROM (SELECT c.star_no, ROW_NUMBER() OVER (ORDER BY c.star_no) AS place
               FROM ${table} WHERE ${where} AND c.v IS NOT NULL AND c.bv IS NOT NULL) q
       JOIN ${table} ON c.transformation_id = :transformation AND c.star_no = q.star_no
      WHERE q.place MOD :step = 0 OR q.star_no = :at ORDER BY c.star_no`,
    { ...values, step, at: at ?? null },
  );
  return rows.map(({ flags, ...star }) => ({ ...star, hasCautions: (flags & ~bitOfNight) !== 0 }));
}
