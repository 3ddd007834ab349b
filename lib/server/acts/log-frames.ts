import 'server-only';
import { frameGeometry, type FrameGeometry } from '@/lib/astro/frame-geometry';
import { frameFaultsInNight, type Frame, type FrameInput, type FrameOrigin } from '@/lib/contracts/api/frame';
import { Fault, type Issue } from '@/lib/faults/fault';
import { recordAudit } from '@/lib/server/data/audit';
import { completeFrames, type Place } from '@/lib/server/data/complete-frames';
import { inTransaction, type Tx } from '@/lib/server/data/database';
import {
  framesInTheWay,
  highestFrameNumber,
  insertFrames,
  toFrameValues,
} from '@/lib/server/data/frame-writes';
import { framesByNumber, toFrame } from '@/lib/server/data/frames';
import { instrumentOf, type InstrumentRow } from '@/lib/server/data/instruments';
import { lockOpenNight } from '@/lib/server/data/night-state';
import { boundsOf, requireNight, subjectOf, type NightRow } from '@/lib/server/data/nights';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { nightScope } from '@/lib/server/policy/scope';

interface Logging {
  readonly origin: FrameOrigin;
  /** Whether faults name the frame's index in front of the field, as a sender of a list needs. */
  readonly isList: boolean;
}

/** Logs frames into an open night: all of them, or none and every fault. */
export async function logFrames(
  caller: PersonCaller,
  id: string,
  inputs: readonly FrameInput[],
  logging: Logging,
): Promise<readonly Frame[]> {
  const night = await requireNight(nightScope(caller), id);
  demand(caller, 'night.log', subjectOf(night));
  const instrument = await instrumentOf(night);
  const completed = await completeFrames(inputs);
  refuse(
    logging,
    inputs.map((input, index) => [
      ...faultsOf(input, night, instrument),
      ...(completed[index]?.issues ?? []),
    ]),
  );
  const places = completed.map(({ place }) => place);
  const geometries = await geometriesOf(inputs, places, instrument);
  return inTransaction(async (tx) => {
    await lockOpenNight(tx, night);
    const numbers = assignNumbers(inputs, await highestFrameNumber(tx, night.id));
    refuse(logging, await clashes(tx, night.id, inputs, numbers));
    const values = inputs.map((input, index) => {
      const [place, geometry, number] = [places[index], geometries[index], numbers[index]];
      if (!place || !geometry || number === undefined)
        throw new Error('Frames and what belongs to them differ in number.');
      return toFrameValues(input, place, geometry, number);
    });
    await insertFrames(
      tx,
      { nightId: night.id, origin: logging.origin, loggedById: caller.personId },
      values,
    );
    const frames = inOrder(numbers, (await framesByNumber(tx, night.id, numbers)).map(toFrame));
    await audit(tx, caller, night, { frames, programmeIds: places.map(({ programmeId }) => programmeId) });
    return frames;
  });
}

function faultsOf(input: FrameInput, night: NightRow, instrument: InstrumentRow): readonly Issue[] {
  const bounds = {
    ...boundsOf(night),
    telescope: instrument.name,
    bands: instrument.filters.map(({ band }) => band),
  };
  return frameFaultsInNight(input, bounds).map(([path, message]) => ({
    path,
    value: input[path] ?? '',
    message,
  }));
}

/** Most faults that one answer tells. */
const maxIssues = 1000;

function refuse(logging: Logging, byFrame: readonly (readonly Issue[])[]): void {
  const issues = byFrame.flatMap((found, index) =>
    found.map((issue) => (logging.isList ? { ...issue, path: `${index}.${issue.path}` } : issue)),
  );
  if (issues.length === 0) return;
  const wrong = byFrame.filter((found) => found.length > 0).length;
  const detail = logging.isList
    ? `${wrong} of ${byFrame.length} frames cannot be logged, so none was.`
    : 'The frame cannot be logged.';
  throw new Fault('invalid-input', detail, { issues: issues.slice(0, maxIssues) });
}

/** Frames between two breaths of the event loop: some ten milliseconds of work. */
const slice = 100;

async function geometriesOf(
  inputs: readonly FrameInput[],
  places: readonly Place[],
  site: InstrumentRow,
): Promise<readonly FrameGeometry[]> {
  const geometries: FrameGeometry[] = [];
  for (const [index, input] of inputs.entries()) {
    if (index % slice === slice - 1) await new Promise((resolve) => setImmediate(resolve));
    const place = places[index];
    const { ra, decl: dec } = place ?? { ra: null, decl: null };
    geometries.push(
      frameGeometry({ site, ra, dec, utcStart: Date.parse(input.utc_start), exposure_s: input.exposure }),
    );
  }
  return geometries;
}

/** Numbers that were given stand; the others follow on from the highest so far, in the order of the list. */
function assignNumbers(inputs: readonly FrameInput[], highest: number): readonly number[] {
  let next = highest + 1;
  return inputs.map(({ number }) => {
    const own = number ?? next;
    next = Math.max(next, own + 1);
    return own;
  });
}

/** Numbers and files that the night or the list has already. */
async function clashes(
  tx: Tx,
  nightId: number,
  inputs: readonly FrameInput[],
  numbers: readonly number[],
): Promise<readonly (readonly Issue[])[]> {
  const files = inputs.flatMap(({ file }) => (file ? [file] : []));
  const inTheWay = await framesInTheWay(tx, nightId, { numbers, files });
  const takenNumbers = new Set(inTheWay.map(({ number }) => number));
  // File names differ by more than case, as the index has it.
  const takenFiles = new Map(inTheWay.map(({ file, number }) => [file?.toLowerCase(), number]));
  const seenNumbers = new Set<number>();
  const seenFiles = new Set<string>();
  return inputs.map((input, index) => {
    const number = numbers[index] ?? 0;
    const file = input.file?.toLowerCase();
    const issues: Issue[] = [];
    if (takenNumbers.has(number)) {
      issues.push({ path: 'number', value: String(number), message: 'is the number of a frame in the log' });
    } else if (seenNumbers.has(number)) {
      issues.push({ path: 'number', value: String(number), message: 'stands twice in this list' });
    }
    if (input.file && file !== undefined) {
      const taken = takenFiles.get(file);
      if (taken !== undefined) {
        issues.push({ path: 'file', value: input.file, message: `is the file of frame ${taken} in the log` });
      } else if (seenFiles.has(file)) {
        issues.push({ path: 'file', value: input.file, message: 'stands twice in this list' });
      }
      seenFiles.add(file);
    }
    seenNumbers.add(number);
    return issues;
  });
}

function inOrder(numbers: readonly number[], frames: readonly Frame[]): readonly Frame[] {
  const byNumber = new Map(frames.map((frame) => [frame.number, frame]));
  return numbers.flatMap((number) => byNumber.get(number) ?? []);
}

interface Logged {
  readonly frames: readonly Frame[];
  readonly programmeIds: readonly (number | null)[];
}

/** One row in the audit trail: of the frame, or of the night when many came at once. */
async function audit(
  tx: Tx,
  caller: PersonCaller,
  night: NightRow,
  { frames, programmeIds }: Logged,
): Promise<void> {
  const [first] = frames;
  const programmes = [...new Set(programmeIds)];
  const common = {
    act: 'frame.log',
    nightId: night.id,
    programmeId: programmes.length === 1 ? (programmes[0] ?? null) : null,
  };
  if (frames.length === 1 && first) {
    await recordAudit(tx, caller, { ...common, subjectKind: 'frame', subjectId: first.id, after: first });
    return;
  }
  const numbers = frames.map(({ number }) => number);
  const after = {
    frames: frames.length,
    lowest: numbers.reduce((a, b) => Math.min(a, b)),
    highest: numbers.reduce((a, b) => Math.max(a, b)),
    origin: first?.origin,
  };
  await recordAudit(tx, caller, { ...common, subjectKind: 'night', subjectId: night.publicId, after });
}
