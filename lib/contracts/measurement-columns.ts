import { z } from 'zod';

/** Columns of a measurement table, in the order in which screens list them. */
export const measurementColumns = [
  { name: 'frame', unit: '', meaning: 'the frame’s number in the night log, or its file name' },
  { name: 'star', unit: '', meaning: 'name of the star' },
  { name: 'ra', unit: 'deg J2000', meaning: 'right ascension, in degrees or as h:m:s' },
  { name: 'dec', unit: 'deg J2000', meaning: 'declination, in degrees or as d:m:s' },
  { name: 'inst_mag', unit: 'mag', meaning: 'instrumental magnitude' },
  { name: 'inst_err', unit: 'mag', meaning: 'its standard error' },
  { name: 'flux', unit: 'counts', meaning: 'counts of the whole exposure, instead of a magnitude' },
  { name: 'flux_err', unit: 'counts', meaning: 'standard error of the counts' },
  { name: 'x', unit: 'pix', meaning: 'position on the detector' },
  { name: 'y', unit: 'pix', meaning: 'position on the detector' },
  { name: 'fwhm', unit: 'pix', meaning: 'width of the image' },
  { name: 'sky', unit: 'counts', meaning: 'background' },
  { name: 'peak', unit: 'counts', meaning: 'highest pixel' },
  { name: 'flag', unit: '', meaning: 'a word or code of your reduction' },
  { name: 'utc_start', unit: 'UTC', meaning: 'start of the exposure, for frames that the log does not have' },
  { name: 'exposure', unit: 's', meaning: 'exposure time, for frames that the log does not have' },
  { name: 'band', unit: '', meaning: 'band, for frames that the log does not have' },
  { name: 'type', unit: '', meaning: 'type of frame, for frames that the log does not have' },
] as const;
export type MeasurementColumn = (typeof measurementColumns)[number]['name'];

export const measurementColumnNames = measurementColumns.map(({ name }) => name) as [
  MeasurementColumn,
  ...MeasurementColumn[],
];
export const MeasurementColumn = z.enum(measurementColumnNames);

/** Which header of the file stands for which column. Columns that the file names as we do need no entry. */
export const ColumnMapping = z.partialRecord(MeasurementColumn, z.string().trim().min(1).max(120)).meta({
  description: 'Column of the measurement table → header in the file',
  example: { inst_mag: 'Magnitude' },
});
export type ColumnMapping = z.infer<typeof ColumnMapping>;

/** Headers are compared without case and surrounding blanks. */
export const headerKey = (header: string): string => header.trim().toLowerCase();

/** What two headers have in common that take one mapping: their names in order. */
export const headersKey = (headers: readonly string[]): string => JSON.stringify(headers.map(headerKey));

/** Position of each column among the headers; a column that is mapped is looked for under its header only. */
export function columnPositions(
  headers: readonly string[],
  mapping: ColumnMapping,
): ReadonlyMap<MeasurementColumn, number> {
  const positionOf = new Map<string, number>();
  headers.forEach((header, position) => {
    const key = headerKey(header);
    if (key !== '' && !positionOf.has(key)) positionOf.set(key, position);
  });
  // A header that is mapped to one column no longer counts under its own name for another.
  const taken = new Set(Object.values(mapping).map(headerKey));
  const positions = new Map<MeasurementColumn, number>();
  for (const column of measurementColumnNames) {
    const mapped = mapping[column];
    if (mapped === undefined && taken.has(column)) continue;
    const position = positionOf.get(headerKey(mapped ?? column));
    if (position !== undefined) positions.set(column, position);
  }
  return positions;
}

/** A need that no column of the file meets: what would meet it, any one of the lists. */
export interface MissingColumns {
  readonly anyOf: readonly (readonly MeasurementColumn[])[];
  readonly message: string;
}

/** What a table must have before one row of it can be read. */
export function missingColumns(present: {
  has(column: MeasurementColumn): boolean;
}): readonly MissingColumns[] {
  const needs: readonly MissingColumns[] = [
    { anyOf: [['frame']], message: 'There is no column that says which frame a row belongs to.' },
    {
      anyOf: [['star'], ['ra', 'dec']],
      message: 'There is no column with the star’s name, nor two with its position.',
    },
    {
      anyOf: [['inst_mag'], ['flux']],
      message: 'There is no column with the instrumental magnitude or the counts.',
    },
    {
      anyOf: [['inst_err'], ['flux', 'flux_err']],
      message: 'There is no column with the standard error of the magnitude or of the counts.',
    },
  ];
  return needs.filter(
    ({ anyOf }) => !anyOf.some((columns) => columns.every((column) => present.has(column))),
  );
}

/**
 * Plain words of the trade, and keywords of FITS, under which a column may stand: for a first guess that a person
 * confirms. Common practice, no source.
 */
const guesses: Partial<Record<MeasurementColumn, readonly string[]>> = {
  frame: ['frame number', 'image', 'picture', 'file', 'file name', 'filename'],
  star: ['name', 'object', 'star name', 'source'],
  ra: ['right ascension', 'ra (deg)', 'ra j2000'],
  dec: ['declination', 'dec (deg)', 'dec j2000'],
  inst_mag: ['instrumental magnitude', 'magnitude', 'mag'],
  inst_err: ['error', 'err', 'uncertainty', 'sigma', 'standard error'],
  flux: ['counts', 'net counts'],
  flux_err: ['flux error', 'counts error'],
  x: ['x (pix)', 'column'],
  y: ['y (pix)', 'row'],
  fwhm: ['fwhm (pix)', 'seeing'],
  sky: ['background', 'sky level'],
  peak: ['maximum', 'brightest pixel'],
  flag: ['flags', 'quality'],
  utc_start: ['date-obs', 'utc', 'start', 'start of exposure'],
  exposure: ['exptime', 'exposure time', 'exposure (s)'],
  band: ['filter', 'passband'],
  type: ['frame type'],
};

/** What headers and guesses have in common: their words, whatever stands between them. */
const guessKey = (header: string): string =>
  headerKey(header)
    .replace(/[^a-z0-9]+/g, '_')
    .replace(/^_|_$/g, '');

/** A first guess at the mapping of headers that do not use our names. A header is given to one column only. */
export function guessMapping(headers: readonly string[]): ColumnMapping {
  const present = columnPositions(headers, {});
  const byKey = new Map(headers.map((header) => [guessKey(header), header.trim()] as const));
  const taken = new Set<string>([...present.keys()].map(guessKey));
  const mapping: ColumnMapping = {};
  for (const column of measurementColumnNames) {
    if (present.has(column)) continue;
    const key = guesses[column]?.map(guessKey).find((guess) => byKey.has(guess) && !taken.has(guess));
    const header = key === undefined ? undefined : byKey.get(key);
    if (key === undefined || header === undefined) continue;
    mapping[column] = header;
    taken.add(key);
  }
  return mapping;
}
