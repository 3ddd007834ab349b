import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { starKey } from '@/lib/contracts/star-name';
import type { CheckResult, Slice } from '@/lib/contracts/measurement-check';
import type { CheckOrder, LoggedFrame } from '@/workers/threads/check-measurements/messages';
import { tableCheck } from '@/workers/threads/check-measurements/table-check';

export interface OrderedStar {
  readonly name: string;
  readonly ra: number;
  readonly dec: number;
  readonly field?: string;
  readonly unusable?: string;
}

export const loggedFrame = (frame: Partial<LoggedFrame> & { readonly number: number }): LoggedFrame => ({
  id: 1000 + frame.number,
  file: null,
  type: 'standard',
  band: 'V',
  exposure_s: 40,
  utcStart: Date.UTC(2026, 10, 3, 20, frame.number),
  ...frame,
});

const standards = (stars: readonly OrderedStar[]): CheckOrder['standards'] => ({
  ids: Int32Array.from(stars, (_, index) => 500 + index),
  names: stars.map(({ name }) => name),
  keys: stars.map(({ name }) => starKey(name)),
  fields: stars.map(({ field }) => field ?? 'SA 114'),
  ra: Float64Array.from(stars, ({ ra }) => ra),
  dec: Float64Array.from(stars, ({ dec }) => dec),
  pmRa: new Float64Array(stars.length).fill(NaN),
  pmDec: new Float64Array(stars.length).fill(NaN),
  unusable: stars.map(({ unusable }) => unusable ?? ''),
});

export interface TestOrder extends Partial<Omit<CheckOrder, 'standards' | 'night'>> {
  readonly stars?: readonly OrderedStar[];
  readonly isOpen?: boolean;
}

/** The night of 3 November 2026 at 17° west. */
export const order = ({ stars, isOpen, ...rest }: TestOrder): CheckOrder => ({
  original: '',
  folder: '',
  kind: 'standard',
  tolerance: 2,
  mapping: {},
  remembered: [],
  frames: [loggedFrame({ number: 1 }), loggedFrame({ number: 2, band: 'B' })],
  standards: standards(stars ?? [{ name: '114-750', ra: 340.436, dec: 1.21 }]),
  site: { longitude: -17.25, latitude: 28.31, elevation: 2300 },
  name: 'test table',
  targets: [],
  night: {
    startsAt: Date.UTC(2026, 10, 3, 12),
    endsAt: Date.UTC(2026, 10, 4, 12),
    isOpen: isOpen ?? true,
    epoch_years: 26.84,
    bands: ['U', 'B', 'V', 'R', 'I'],
    telescope: 'Larkspur 0.8 m',
  },
  ...rest,
});

export interface CheckedTable {
  readonly result: CheckResult;
  /** Fields of the files that would be loaded. */
  readonly rows: readonly (readonly string[])[];
  readonly stars: readonly (readonly string[])[];
  readonly flags: readonly (readonly string[])[];
}

/** Checks a table as the thread does, without a thread. */
export function checkTable(
  content: string | Uint8Array,
  given: TestOrder = {},
  pieceSize = 1 << 19,
): CheckedTable {
  const folder = mkdtempSync(path.join(tmpdir(), 'evenfall-table-'));
  try {
    const slices: Slice[] = [];
    const check = tableCheck(order({ ...given, folder }), (slice) => slices.push(slice));
    const bytes = typeof content === 'string' ? Buffer.from(content) : content;
    for (let at = 0; at < bytes.length; at += pieceSize) check.push(bytes.subarray(at, at + pieceSize));
    const result = check.finish(() => undefined);
    const read = (files: readonly Slice[] = []): string[][] =>
      files.flatMap(({ file }) =>
        readFileSync(file, 'utf8')
          .split('\n')
          .slice(0, -1)
          .map((line) => line.split('\t')),
      );
    const { load } = result;
    const rows = load === null ? [] : read([...slices, ...load.slices]);
    return { result, rows, stars: read(load?.stars), flags: read(load?.flags) };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
