import 'server-only';
import type { NewFrame } from '@/lib/contracts/measurement-check';
import { Fault } from '@/lib/faults/fault';
import { select, type Tx } from './database';
import { framesInTheWay, highestFrameNumber, insertFrames, toFrameValues } from './frame-writes';
import type { MeasurementSetRow } from './measurement-sets';
import { lockNight } from './night-state';

/**
 * Creates the frames that a table told enough of, marked “from upload”, and returns their ids in the same order. The
 * fault is `stale` when the night was closed meanwhile, or got frames with their numbers or files.
 */
export async function createFrames(
  tx: Tx,
  set: MeasurementSetRow,
  frames: readonly NewFrame[],
): Promise<readonly number[]> {
  if (frames.length === 0) return [];
  const night = { id: set.nightId, publicId: set.nightPublicId, date: set.nightDate };
  const { state } = await lockNight(tx, night);
  const numbers = assignNumbers(frames, await highestFrameNumber(tx, set.nightId));
  const files = frames.flatMap(({ file }) => file ?? []);
  const inTheWay = await framesInTheWay(tx, set.nightId, { numbers, files });
  if (state !== 'open' || inTheWay.length > 0) {
    throw new Fault('stale', 'The log was changed while the table was being checked.');
  }
  const values = frames.map((frame, index) => {
    const told = {
      ...frame,
      utc_start: new Date(frame.utcStart).toISOString(),
      exposure: frame.exposure_s,
      comment: `from upload: ${set.name}`,
    };
    return toFrameValues(told, frame.place, frame.geometry, numbers[index] ?? 0);
  });
  await insertFrames(tx, { nightId: set.nightId, origin: 'upload', loggedById: set.uploadedById }, values);
  return idsOf(tx, set.nightId, numbers);
}

/** Numbers that the table gives stand; frames named by a file follow on, in the order in which they began. */
function assignNumbers(frames: readonly NewFrame[], highest: number): readonly number[] {
  const given = frames.flatMap(({ number }) => number ?? []);
  let next = given.reduce((a, b) => Math.max(a, b), highest);
  const numbers = frames.map(({ number }) => number ?? 0);
  const byStart = frames
    .map((frame, index) => ({ frame, index }))
    .filter(({ frame }) => frame.number === null);
  byStart.sort((a, b) => a.frame.utcStart - b.frame.utcStart || a.index - b.index);
  for (const { index } of byStart) {
    next += 1;
    numbers[index] = next;
  }
  return numbers;
}

async function idsOf(tx: Tx, nightId: number, numbers: readonly number[]): Promise<readonly number[]> {
  const rows = await select<{ id: number; number: number }>(
    'SELECT id, number FROM frames WHERE night_id = :nightId AND number IN (:numbers)',
    { nightId, numbers },
    tx,
  );
  const byNumber = new Map(rows.map(({ id, number }) => [number, id]));
  return numbers.map((number) => {
    const id = byNumber.get(number);
    if (id === undefined) throw new Error(`Frame ${number} was created and is not there.`);
    return id;
  });
}
