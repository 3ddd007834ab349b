import { tableColumns as c, under, writeTable } from './measurement-table';
import type { Measurement } from './simulate-night';

/** Files by name. */
export type Files = ReadonlyMap<string, string>;

const plain = [c.frame, c.star, c.ra, c.dec, c.instMag, c.instErr, c.x, c.y, c.fwhm, c.sky, c.peak];

const heading = (what: string): readonly string[] => [
  `Larkspur 0.8 m, Marrow Hill Observatory: ${what}`,
  'Simulated for the demonstration of Evenfall. inst_mag = 25 - 2.5 log10(counts per second)',
];

const isStandard = ({ frame }: Measurement): boolean => frame.type === 'standard';
const isTarget = ({ frame }: Measurement): boolean => frame.type === 'target';

/** The night's two tables: standards, whose frames are named by their files, and targets. */
export function nightTables(prefix: string, measurements: readonly Measurement[]): Files {
  const standards = [c.fileName, ...plain.slice(1)];
  const targets = [c.frame, c.star, c.ra, c.dec, c.instMag, c.instErr, c.x, c.y];
  return new Map([
    [
      `${prefix}-standards.csv`,
      writeTable(
        heading(`standard stars of the night ${prefix}`),
        standards,
        measurements.filter(isStandard),
      ),
    ],
    [
      `${prefix}-targets.csv`,
      writeTable(heading(`programme targets of the night ${prefix}`), targets, measurements.filter(isTarget)),
    ],
  ]);
}

/** Standards under headers of another program, for the screen that maps columns; positions in sexagesimal notation. */
export function foreignTable(prefix: string, measurements: readonly Measurement[]): Files {
  const columns = [
    under('Picture', c.fileName),
    under('Source', c.star),
    under('Right ascension', c.raSexagesimal),
    under('Declination', c.decSexagesimal),
    under('Magnitude', c.instMag),
    under('Uncertainty', c.instErr),
    under('Column', c.x),
    under('Row', c.y),
    under('Brightest pixel', c.peak),
  ];
  const content = writeTable(
    heading('standard stars under other headers'),
    columns,
    measurements.filter(isStandard),
  );
  return new Map([[`${prefix}-standards-other-headers.csv`, content]]);
}

/** Standards with one star measured in another's place throughout the night. */
export function mistakenTable(prefix: string, measurements: readonly Measurement[]): Files {
  const content = writeTable(
    heading('standard stars, one of them mistaken for its neighbour'),
    plain,
    measurements.filter(isStandard),
  );
  return new Map([[`${prefix}-standards-misidentified.csv`, content]]);
}

/** Standards on frames that the log does not have: the table itself says when and how they were taken. */
export function newFramesTable(name: string, measurements: readonly Measurement[]): Files {
  const columns = [c.frame, c.utcStart, c.exposure, c.band, c.type, ...plain.slice(1)];
  return new Map([
    [name, writeTable(heading('standard stars on frames missing from the log'), columns, measurements)],
  ]);
}

/** Spoils one line; `cells` are those of the table below, in its order. */
type Fault = (cells: readonly string[]) => readonly string[];
const replace =
  (place: number, text: string): Fault =>
  (cells) =>
    cells.map((cell, index) => (index === place ? text : cell));

const faultyColumns = [c.frame, c.band, ...plain.slice(1)];
const at = (header: string): number => faultyColumns.findIndex((column) => column.header === header);

/** What is wrong in the faulty table, a line each, and in which data line it stands. */
export const faults: readonly { readonly row: number; readonly what: string; readonly spoil: Fault }[] = [
  { row: 2, what: 'a magnitude that is not a number', spoil: replace(at('inst_mag'), '14.2.31') },
  { row: 4, what: 'no standard error', spoil: replace(at('inst_err'), '') },
  { row: 6, what: 'a frame that the log does not have', spoil: replace(at('frame'), '9041') },
  { row: 9, what: 'a negative standard error', spoil: replace(at('inst_err'), '-0.0042') },
  { row: 12, what: 'a magnitude NaN', spoil: replace(at('inst_mag'), 'NaN') },
  {
    row: 14,
    what: 'a band that is not the frame’s',
    spoil: (cells) => replace(at('band'), cells[at('band')] === 'V' ? 'B' : 'V')(cells),
  },
  { row: 17, what: 'a band that does not exist', spoil: replace(at('band'), 'Q') },
  { row: 19, what: 'a right ascension beyond 360 degrees', spoil: replace(at('ra'), '412.500000') },
  { row: 22, what: 'a declination below the pole', spoil: replace(at('dec'), '-95.250000') },
  { row: 25, what: 'too few fields', spoil: (cells) => cells.slice(0, 7) },
  {
    row: 28,
    what: 'too many fields: a decimal comma',
    spoil: (cells) => cells.map((cell, index) => (index === at('inst_mag') ? cell.replace('.', ',') : cell)),
  },
  { row: 31, what: 'no frame', spoil: replace(at('frame'), '') },
  {
    row: 34,
    what: 'neither name nor position',
    spoil: (cells) => ['star', 'ra', 'dec'].reduce((line, header) => replace(at(header), '')(line), cells),
  },
  { row: 37, what: 'a standard error of zero', spoil: replace(at('inst_err'), '0') },
  { row: 40, what: 'an infinite peak', spoil: replace(at('peak'), 'Infinity') },
  { row: 43, what: 'text where a pixel position belongs', spoil: replace(at('x'), 'n/a') },
];
/** This data line is there twice. */
export const repeatedRow = 46;
const faultyLength = 60;

/** Sixty lines of standards with as many kinds of faults as people make, and good lines between. */
export function faultyTable(prefix: string, measurements: readonly Measurement[]): Files {
  const rows = measurements.filter(isStandard).slice(0, faultyLength);
  const whole = writeTable(heading('standard stars, spoilt on purpose'), faultyColumns, rows)
    .trimEnd()
    .split('\n');
  const headLines = whole.length - rows.length;
  const lines = whole.slice(headLines).map((line, index) => {
    const fault = faults.find(({ row }) => row === index + 1);
    return fault === undefined ? line : fault.spoil(line.split(',')).join(',');
  });
  lines.splice(repeatedRow, 0, lines[repeatedRow - 1] ?? '');
  return new Map([
    [`${prefix}-standards-faulty.csv`, `${[...whole.slice(0, headLines), ...lines].join('\n')}\n`],
  ]);
}
