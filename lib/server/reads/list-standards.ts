import 'server-only';
import { separation } from '@/lib/astro/separation';
import type { Standard, StandardQuery } from '@/lib/contracts/api/standard';
import type { List } from '@/lib/contracts/common';
import { starKey } from '@/lib/contracts/star-name';
import { fromCursor, pageOf } from '@/lib/server/data/cursor';
import { standardFieldNames, standards, type StandardRow } from '@/lib/server/data/standards';
import type { Caller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';

interface Placed {
  readonly row: StandardRow;
  /** deg; null without a centre. */
  readonly separation: number | null;
}

/** Standard stars of a query, around its centre the nearest first, otherwise by right ascension. */
export async function listStandards(caller: Caller, query: StandardQuery): Promise<List<Standard>> {
  demand(caller, 'standards.see');
  const after = fromCursor(query.after, ['number', 'string']);
  const found = await search(query);
  const order = (one: Placed): readonly [number, string] => [one.separation ?? one.row.ra, one.row.name];
  const sorted = [...found].sort((a, b) => compare(order(a), order(b)));
  const rest = after === null ? sorted : sorted.filter((one) => compare(order(one), after) > 0);
  const page = pageOf(rest.slice(0, query.limit + 1), query.limit, order);
  return { items: page.rows.map(toStandard), next: page.next };
}

const compare = (a: readonly (string | number)[], b: readonly (string | number)[]): number => {
  const place = a.findIndex((part, index) => part !== b[index]);
  const [x, y] = [a[place], b[place]];
  return place === -1 || x === undefined || y === undefined ? 0 : x < y ? -1 : 1;
};

async function search({ ra, dec, radius, field, name }: StandardQuery): Promise<readonly Placed[]> {
  const fieldName = field === undefined ? undefined : await fieldBySpelling(field);
  // A field that is not there has no stars.
  if (fieldName === null) return [];
  const nameKey = name === undefined ? undefined : starKey(name);
  if (ra === undefined || dec === undefined || radius === undefined) {
    return (await standards({ field: fieldName, nameKey })).map((row) => ({ row, separation: null }));
  }
  // The band is what the index can tell; a hair wider, so that rounding loses no star at its edge.
  const band = { from: dec - radius - 1e-9, to: dec + radius + 1e-9 };
  const rows = await standards({ field: fieldName, nameKey, band });
  return rows
    .map((row) => ({ row, separation: separation({ ra, dec }, row) }))
    .filter((one) => one.separation <= radius);
}

/** The field's own spelling; null when there is none. */
async function fieldBySpelling(spelling: string): Promise<string | null> {
  const key = starKey(spelling);
  return (await standardFieldNames()).find((field) => starKey(field) === key) ?? null;
}

function toStandard({ row, separation: distance }: Placed): Standard {
  return {
    name: row.name,
    field: row.field,
    ra: row.ra,
    dec: row.dec,
    pm_ra: row.pmRa,
    pm_dec: row.pmDec,
    V: row.v,
    BV: row.bv,
    UB: row.ub,
    VR: row.vr,
    RI: row.ri,
    VI: rounded(row.vi),
    e_V: row.eV,
    e_BV: row.eBv,
    e_UB: row.eUb,
    e_VR: row.eVr,
    e_RI: row.eRi,
    e_VI: row.eVi,
    default_error: row.defaultError,
    n: row.nObservations,
    usable: row.isUsable,
    caution: row.caution,
    source: row.source,
    separation: distance,
  };
}

/** A sum of two values with three decimals has three decimals. */
const rounded = (value: number | null): number | null => (value === null ? null : Number(value.toFixed(4)));
