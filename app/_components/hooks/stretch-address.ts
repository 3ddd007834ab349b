/** A stretch of the night in the page's address, so that links, tables and plots agree on it. */
export interface AddressStretch {
  /** ms */
  readonly from: number;
  readonly to: number;
}

interface Query {
  get(name: string): string | null;
}

const instant = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d{1,3})?)?Z$/;

function read(text: string | null): number | null {
  if (text === null || !instant.test(text)) return null;
  const utc = Date.parse(text);
  return Number.isFinite(utc) ? utc : null;
}

/** The stretch that an address names; null when it names none, or none that is one. */
export function stretchOf(query: Query): AddressStretch | null {
  const from = read(query.get('from'));
  const to = read(query.get('to'));
  return from === null || to === null || to <= from ? null : { from, to };
}

const written = (utc: number) => new Date(utc).toISOString().replace(/\.000Z$/, 'Z');

/** The same query with another stretch, or with none; everything else in it stays. */
export function withStretch(query: string, stretch: AddressStretch | null): string {
  const params = new URLSearchParams(query);
  params.delete('from');
  params.delete('to');
  if (stretch !== null) {
    params.set('from', written(stretch.from));
    params.set('to', written(stretch.to));
  }
  return params.toString().replaceAll('%3A', ':');
}
