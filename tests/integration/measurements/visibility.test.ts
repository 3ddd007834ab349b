import { beforeAll, describe, expect, it } from 'vitest';
import { FrameInput } from '@/lib/contracts/api/frame';
import type { Night } from '@/lib/contracts/api/night';
import { isFault } from '@/lib/faults/fault';
import { logFrames } from '@/lib/server/acts/log-frames';
import { openNight } from '@/lib/server/acts/open-night';
import type { PersonCaller } from '@/lib/server/policy/caller';
import {
  measuredStars,
  measurementFaults,
  measurementOriginal,
  measurementRows,
  measurementSummary,
} from '@/lib/server/reads/measurement-contents';
import { measurementSet, nightMeasurements } from '@/lib/server/reads/measurement-sets';
import { measurementsPage } from '@/lib/server/reads/measurements-page';
import { setPage } from '@/lib/server/reads/set-page';
import { newCallers, newLogWorld, newStandards } from '@/tests/support/log-world';
import { check, removeOriginals, upload } from '@/tests/support/measurements';

removeOriginals();
let night: Night;
/** Rows on frames of two programmes and on a standard frame. */
let mixed: string;
/** Rows on one programme's frame and the standard frame only. */
let own: string;
let refused: string;
let as: (name: string) => PersonCaller;
const page = { limit: 100 };

beforeAll(async () => {
  const { thistle, marrow } = await newLogWorld();
  await newStandards();
  as = await newCallers({
    observer: { roles: ['observer'] },
    stranger: { roles: ['observer'] },
    photometrist: { roles: ['photometrist'] },
    manager: { roles: ['manager'] },
    thistlePi: { programmes: [[thistle, 'pi']] },
    thistleCo: { programmes: [[thistle, 'coinvestigator']] },
    marrowCo: { programmes: [[marrow, 'coinvestigator']] },
    nobody: {},
  });
  night = await openNight(as('observer'), { telescope: 'larkspur', date: '2026-06-01' });
  const frame = (object: string, type: string, hour: string): FrameInput =>
    FrameInput.parse({ type, object, band: 'V', utc_start: `2026-06-01T${hour}:00:00Z`, exposure: 60 });
  const frames = [
    frame('Thistle 3', 'target', '22'),
    frame('LV Marrow', 'target', '23'),
    frame('SA 98', 'standard', '21'),
  ];
  await logFrames(as('observer'), night.id, frames, { origin: 'log', isList: true });
  const table = (...rows: readonly string[]): string =>
    `# secret words\nframe,star,inst_mag,inst_err\n${rows.map((row) => `${row},-7,0.01\n`).join('')}`;
  const taken = async (content: string): Promise<string> => {
    const { set } = await upload(as('observer'), night.id, content);
    await check({ set });
    return set;
  };
  mixed = await taken(table('1,T1', '2,M1', '3,SA 98-1', '1,Shared', '2,Shared'));
  own = await taken(table('1,T1', '3,SA 98-1'));
  refused = await taken(table('1,T1', '9,M9'));
});

async function outcomeOf(work: Promise<unknown>): Promise<string> {
  try {
    await work;
    return 'seen';
  } catch (error) {
    if (isFault(error)) return error.code;
    throw error;
  }
}

describe('a measurement set', () => {
  it.each([
    ['observer', 'seen'],
    ['photometrist', 'seen'],
    ['manager', 'seen'],
    ['thistlePi', 'seen'],
    ['marrowCo', 'seen'],
    ['stranger', 'not-found'],
    ['nobody', 'not-found'],
  ])('of a night is for %s: %s', async (name, outcome) => {
    expect(await outcomeOf(measurementSet(as(name), mixed))).toBe(outcome);
    expect(await outcomeOf(nightMeasurements(as(name), night.id, page))).toBe(outcome);
    expect(await outcomeOf(setPage(as(name), mixed, {}))).toBe(outcome);
  });

  it('shows investigators the rows and stars on frames of their programme, and on standard frames', async () => {
    const starsOf = async (name: string): Promise<readonly string[]> =>
      (await measuredStars(as(name), mixed, page)).items.map((star) => star.name);
    const rowsOf = async (name: string): Promise<readonly string[]> =>
      (await measurementRows(as(name), mixed, page)).items.map((row) => `${row.frame} ${row.star}`);
    expect(await rowsOf('observer')).toEqual(['1 T1', '2 M1', '3 SA 98-1', '1 Shared', '2 Shared']);
    expect(await rowsOf('thistlePi')).toEqual(['1 T1', '3 SA 98-1', '1 Shared']);
    expect(await rowsOf('marrowCo')).toEqual(['2 M1', '3 SA 98-1', '2 Shared']);
    expect(await starsOf('observer')).toEqual(['T1', 'M1', 'SA 98-1', 'Shared']);
    expect(await starsOf('thistlePi')).toEqual(['T1', 'SA 98-1', 'Shared']);
    expect(await starsOf('marrowCo')).toEqual(['M1', 'SA 98-1', 'Shared']);
    const summary = await measurementSummary(as('thistlePi'), mixed);
    expect(summary.frames.map(({ number }) => number)).toEqual([1, 3]);
    expect(summary.tally.reduce((sum, { nStars }) => sum + nStars, 0)).toBe(3);
  });

  it('keeps original, comments and file name from investigators where it holds other programmes’ rows', async () => {
    for (const name of ['observer', 'photometrist', 'manager']) {
      expect(await outcomeOf(measurementOriginal(as(name), mixed))).toBe('seen');
    }
    for (const name of ['thistlePi', 'thistleCo', 'marrowCo']) {
      expect(await outcomeOf(measurementOriginal(as(name), mixed))).toBe('not-found');
      expect(await measurementSet(as(name), mixed)).toMatchObject({
        is_whole: false,
        comments: '',
        file_name: null,
        rows: 3,
        matched_rows: null,
      });
    }
    expect(await outcomeOf(measurementOriginal(as('thistlePi'), own))).toBe('seen');
    expect(await measurementSet(as('thistlePi'), own)).toMatchObject({
      is_whole: true,
      comments: 'secret words',
    });
    expect(await outcomeOf(measurementOriginal(as('marrowCo'), own))).toBe('not-found');
  });

  it('that was refused tells its faults to who uploaded it and to the staff only', async () => {
    for (const name of ['observer', 'photometrist', 'manager']) {
      expect(await outcomeOf(measurementFaults(as(name), refused, page))).toBe('seen');
    }
    for (const name of ['thistlePi', 'marrowCo', 'stranger']) {
      expect(await outcomeOf(measurementFaults(as(name), refused, page))).toBe('not-found');
    }
    expect(await setPage(as('thistlePi'), refused, {})).toMatchObject({ contents: null });
  });
});

describe('uploading', () => {
  const table = 'frame,star,inst_mag,inst_err\n1,X,-7,0.01\n';
  it.each([
    ['stranger', 'not-allowed'],
    ['manager', 'not-allowed'],
    ['thistleCo', 'not-allowed'],
    ['nobody', 'not-found'],
  ])('is refused to %s: %s', async (name, outcome) => {
    expect(await outcomeOf(upload(as(name), night.id, table))).toBe(outcome);
  });

  it('is for photometrists, the night’s observers and the investigators who lead a programme in it', async () => {
    for (const name of ['observer', 'photometrist', 'thistlePi']) {
      expect(await outcomeOf(upload(as(name), night.id, `# ${name}\n${table}`))).toBe('seen');
      expect(await measurementsPage(as(name), night.id)).toMatchObject({ mayUpload: true });
    }
    expect(await measurementsPage(as('stranger'), night.id)).toMatchObject({ mayUpload: false, sets: null });
  });

  it('is refused to a token that may only read', async () => {
    const reader = { ...as('observer'), scopes: new Set(['read'] as const) };
    expect(await outcomeOf(upload(reader, night.id, table))).toBe('not-allowed');
  });
});
