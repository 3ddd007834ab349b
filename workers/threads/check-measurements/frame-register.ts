import type { Band, FrameType } from '@/lib/contracts/bands';
import type { MeasurementColumn } from '@/lib/contracts/measurement-columns';
import type { IssueText } from '@/lib/formats/issue-list';
import type { LoggedFrame, NightBounds } from './messages';

/** What a row says about its frame; NaN and '' mean that it does not. */
export interface FrameRow {
  readonly line: number;
  readonly frame: string;
  /** [ms since 1970-01-01T00:00:00Z] */
  readonly utcStart: number;
  readonly exposure_s: number;
  readonly band: Band | '';
  readonly type: FrameType | '';
}

/** A frame of the log, or one that the table tells enough of to create it. Frames count from 0, new ones after logged ones. */
export interface RegisteredFrame {
  /** Null for a frame that is to be created. */
  readonly id: number | null;
  readonly number: number | null;
  readonly file: string | null;
  readonly type: FrameType | '';
  readonly band: Band | null;
  readonly exposure_s: number;
  readonly utcStart: number;
  /** Line that created it; 0 for a frame of the log. */
  readonly line: number;
}

/** A frame in a row that is to be loaded: its id; −1, −2, … for those that are to be created, which follow the logged ones. */
export const frameField = (id: number | null | undefined, index: number, nLogged: number): number =>
  id ?? nLogged - index - 1;

export type FrameIssue = IssueText & { readonly column: MeasurementColumn };

export interface FrameRegister {
  /** The frame of a row, or everything wrong with what the row says of it. */
  readonly find: (row: FrameRow) => number | readonly FrameIssue[];
  readonly frame: (index: number) => RegisteredFrame;
  readonly frames: () => readonly RegisteredFrame[];
}

/** Exposure times may differ by so much between log and table. [s, and as a part] */
const exposureSlack_s = 0.5;
const exposureSlack = 0.01;
/** Two exposures of one band that begin within this are one frame. [ms] */
const sameStart_ms = 2000;
const noStars: ReadonlySet<string> = new Set<FrameType>(['bias', 'dark', 'flat']);

export function frameRegister(logged: readonly LoggedFrame[], night: NightBounds): FrameRegister {
  const frames: RegisteredFrame[] = logged.map((frame) => ({ ...frame, line: 0 }));
  const byNumber = new Map<number, number>();
  const byFile = new Map<string, number>();
  const byLooseFile = new Map<string, number[]>();
  const known = new Map<string, number | IssueText>();
  frames.forEach((frame, index) => enter(frame, index));

  function enter({ number, file }: RegisteredFrame, index: number): void {
    if (number !== null) byNumber.set(number, index);
    if (file === null) return;
    byFile.set(file, index);
    const loose = looseFile(file);
    byLooseFile.set(loose, [...(byLooseFile.get(loose) ?? []), index]);
  }

  /** The frame of a number or file name; undefined when there is none, a text when it could be two. */
  function lookUp(text: string): number | IssueText | undefined {
    const number = /^\d{1,7}$/.test(text) ? byNumber.get(Number(text)) : undefined;
    const file = byFile.get(text);
    if (number !== undefined && file !== undefined && number !== file) {
      const message = `This is the number of one frame and the file name of another (frame ${frames[file]?.number}).`;
      return {
        message,
        remedy: 'Write the file name with its ending, or give one of the frames another file name.',
      };
    }
    const exact = number ?? file;
    if (exact !== undefined) return exact;
    const alike = byLooseFile.get(looseFile(text)) ?? [];
    if (alike.length < 2) return alike[0];
    const list = alike.map((index) => frames[index]?.file).join(', ');
    return {
      message: `This could be ${alike.length} frames: ${list}.`,
      remedy: 'Write the file name exactly.',
    };
  }

  function find(row: FrameRow): number | readonly FrameIssue[] {
    let found = known.get(row.frame);
    if (found === undefined) {
      found = lookUp(row.frame);
      // What is unknown is not remembered: a later row may say enough to create it.
      if (found !== undefined) known.set(Buffer.from(row.frame, 'utf8').toString('utf8'), found);
    }
    if (found === undefined) return create(row);
    if (typeof found !== 'number') return [{ column: 'frame', ...found }];
    const frame = frames[found];
    const issues = frame ? disagreements(frame, row) : [];
    return issues.length > 0 ? issues : found;
  }

  function create(row: FrameRow): number | readonly FrameIssue[] {
    const issues = whyNotCreated(row, night, frames);
    if (issues.length > 0) return issues;
    const number = /^[1-9]\d{0,6}$/.test(row.frame) ? Number(row.frame) : null;
    const frame: RegisteredFrame = {
      id: null,
      number,
      file: number === null ? Buffer.from(row.frame, 'utf8').toString('utf8') : null,
      type: row.type,
      band: row.band === '' ? null : row.band,
      exposure_s: row.exposure_s,
      utcStart: row.utcStart,
      line: row.line,
    };
    frames.push(frame);
    enter(frame, frames.length - 1);
    return frames.length - 1;
  }

  return {
    find,
    frame: (index) => {
      const frame = frames[index];
      if (!frame) throw new RangeError(`There is no frame ${index} in the register.`);
      return frame;
    },
    frames: () => frames,
  };
}

/** A file name without its folder, its case and the endings that frames have. */
function looseFile(file: string): string {
  const base = file.slice(Math.max(file.lastIndexOf('/'), file.lastIndexOf('\\')) + 1);
  return base.toLowerCase().replace(/(\.(fits|fit|fts))?(\.(gz|fz|bz2))?$/, '');
}

/** Where a row contradicts the frame that it names. */
function disagreements(frame: RegisteredFrame, row: FrameRow): readonly FrameIssue[] {
  const issues: FrameIssue[] = [];
  if (noStars.has(frame.type)) {
    const message = `This frame is a ${frame.type}: no star is measured on it.`;
    issues.push({ column: 'frame', message, remedy: 'Correct the frame’s number, or its type in the log.' });
  } else if (frame.band === null) {
    const message = 'This frame has no band in the night log.';
    issues.push({
      column: 'frame',
      message,
      remedy: 'Enter its band in the log, then upload the table again.',
    });
  }
  if (row.band !== '' && frame.band !== null && row.band !== frame.band) {
    issues.push(differs(frame, 'band', `the band ${frame.band}`));
  }
  if (!Number.isNaN(row.exposure_s)) {
    const slack = Math.max(exposureSlack_s, exposureSlack * frame.exposure_s);
    if (Math.abs(row.exposure_s - frame.exposure_s) > slack) {
      issues.push(differs(frame, 'exposure', `an exposure of ${frame.exposure_s} s`));
    }
  }
  if (frame.line > 0 && Math.abs(row.utcStart - frame.utcStart) > sameStart_ms) {
    issues.push(differs(frame, 'utc_start', `the start ${new Date(frame.utcStart).toISOString()}`));
  }
  if (frame.line > 0 && row.type !== '' && row.type !== frame.type) {
    issues.push(differs(frame, 'type', frame.type === '' ? 'no type' : `the type ${frame.type}`));
  }
  return issues;
}

function differs(frame: RegisteredFrame, column: MeasurementColumn, there: string): FrameIssue {
  const where = frame.line === 0 ? 'in the night log' : `in line ${frame.line}`;
  const remedy =
    frame.line === 0 ? 'Correct the table, or the frame in the log.' : 'Write one value for the whole frame.';
  return { column, message: `This frame has ${there} ${where}.`, remedy };
}

/** Why a frame that the log does not have cannot be created from a row. */
function whyNotCreated(
  row: FrameRow,
  night: NightBounds,
  frames: readonly RegisteredFrame[],
): readonly FrameIssue[] {
  const has = [!Number.isNaN(row.utcStart), !Number.isNaN(row.exposure_s), row.band !== ''];
  if (!has.every(Boolean)) {
    const remedy = night.isOpen
      ? 'Correct its number or name, log it, or give its utc_start, exposure and band in the table, so that it is created.'
      : 'Correct its number or name, or open the night again and log it.';
    return [{ column: 'frame', message: 'This frame is not in the night log.', remedy }];
  }
  if (!night.isOpen) {
    const remedy = 'Correct its number or name, or open the night again, so that the upload can create it.';
    return [{ column: 'frame', message: 'This frame is not in the log, and the night is closed.', remedy }];
  }
  const issues: FrameIssue[] = [];
  if (/^0+$/.test(row.frame)) {
    issues.push({
      column: 'frame',
      message: 'Frames count from 1.',
      remedy: 'Write the number of the frame.',
    });
  }
  if (row.utcStart < night.startsAt || row.utcStart >= night.endsAt) {
    const span = `${new Date(night.startsAt).toISOString()} to ${new Date(night.endsAt).toISOString()}`;
    issues.push({
      column: 'utc_start',
      message: `This does not lie in the night, which runs from noon to noon, ${span}.`,
      remedy: 'Write the start in UTC, or upload the table to its own night.',
    });
  }
  if (row.type !== '' && noStars.has(row.type)) {
    issues.push({
      column: 'type',
      message: `No star is measured on a ${row.type}.`,
      remedy: 'Write standard or target.',
    });
  }
  if (row.band !== '' && !night.bands.includes(row.band)) {
    const message = `${night.telescope} has no filter for this band.`;
    issues.push({ column: 'band', message, remedy: `Write one of ${night.bands.join(', ')}.` });
  }
  const twin = frames.find(
    (one) => one.band === row.band && Math.abs(one.utcStart - row.utcStart) <= sameStart_ms,
  );
  if (twin) {
    const name = twin.number === null ? (twin.file ?? '') : `frame ${twin.number}`;
    const there = twin.line === 0 ? 'in the log' : `of line ${twin.line}`;
    issues.push({
      column: 'frame',
      message: `This exposure began when ${name} ${there} did, in the same band.`,
      remedy: `Write ${twin.number ?? twin.file ?? ''}${twin.line === 0 ? ', or give the logged frame this file name' : ''}.`,
    });
  }
  return issues;
}
