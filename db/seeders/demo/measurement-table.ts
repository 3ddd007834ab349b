import { formatDeclination, formatRightAscension } from '@/lib/astro/format-sexagesimal';
import type { Measurement } from './simulate-night';

/** One column of a table of measurements: its header and how a cell is written. */
export interface TableColumn {
  readonly header: string;
  readonly cell: (measurement: Measurement) => string;
}

const column = (header: string, cell: TableColumn['cell']): TableColumn => ({ header, cell });

/** Columns by their own names; sample tables choose among them. */
export const tableColumns = {
  frame: column('frame', ({ frame }) => String(frame.number)),
  fileName: column('frame', ({ frame }) => frame.file),
  star: column('star', ({ star }) => star),
  ra: column('ra', ({ ra }) => ra.toFixed(6)),
  dec: column('dec', ({ dec }) => dec.toFixed(6)),
  raSexagesimal: column('ra', ({ ra }) => formatRightAscension(ra, 3)),
  decSexagesimal: column('dec', ({ dec }) => formatDeclination(dec, 2)),
  instMag: column('inst_mag', ({ instMag }) => instMag.toFixed(4)),
  instErr: column('inst_err', ({ instErr }) => instErr.toFixed(4)),
  x: column('x', ({ x }) => x.toFixed(2)),
  y: column('y', ({ y }) => y.toFixed(2)),
  fwhm: column('fwhm', ({ fwhm_px }) => fwhm_px.toFixed(2)),
  sky: column('sky', ({ sky }) => sky.toFixed(1)),
  peak: column('peak', ({ peak }) => peak.toFixed(0)),
  band: column('band', ({ frame }) => frame.band ?? ''),
  utcStart: column('utc_start', ({ frame }) => new Date(frame.utcStart).toISOString()),
  exposure: column('exposure', ({ frame }) => String(frame.exposure_s)),
  type: column('type', ({ frame }) => frame.type),
} as const;

/** The same column under another header. */
export const under = (header: string, { cell }: TableColumn): TableColumn => ({ header, cell });

/** A table as text: comments, header, one line a measurement. None of the demo's cells needs quotes. */
export function writeTable(
  comments: readonly string[],
  columns: readonly TableColumn[],
  measurements: readonly Measurement[],
): string {
  const lines = [
    ...comments.map((comment) => `# ${comment}`),
    columns.map(({ header }) => header).join(','),
    ...measurements.map((measurement) => columns.map(({ cell }) => cell(measurement)).join(',')),
  ];
  return `${lines.join('\n')}\n`;
}
