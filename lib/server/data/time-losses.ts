import 'server-only';
import type { LossCause, TimeLoss } from '@/lib/contracts/api/time-loss';
import { Fault } from '@/lib/faults/fault';
import { execute, insert, select, selectOne, type Tx } from './database';

interface TimeLossRow {
  readonly id: number;
  readonly publicId: string;
  readonly cause: LossCause;
  readonly minutes: number;
  readonly comment: string;
  readonly recordedBy: string;
}

const selection = `SELECT l.id, l.public_id AS publicId, l.cause, l.minutes, l.comment, p.name AS recordedBy
  FROM time_losses l JOIN people p ON p.id = l.recorded_by_id`;

/** Time lost in a night that the caller may see, in the order of entry: a handful of rows. */
export async function allTimeLossRows(nightId: number): Promise<readonly TimeLossRow[]> {
  return select<TimeLossRow>(`${selection} WHERE l.night_id = :nightId ORDER BY l.id`, { nightId });
}

export async function findTimeLoss(tx: Tx, nightId: number, publicId: string): Promise<TimeLossRow | null> {
  return selectOne<TimeLossRow>(
    `${selection} WHERE l.night_id = :nightId AND l.public_id = :publicId`,
    { nightId, publicId },
    tx,
  );
}

/** A night has at most 25 hours, when the clocks go back; the caller holds the night. */
const minutesOfNight = 25 * 60;

/** Refuses losses that are longer, all together, than the night. */
export async function demandRoomForLoss(
  tx: Tx,
  nightId: number,
  minutes: number,
  replacedId: number | null,
): Promise<void> {
  const row = await selectOne<{ minutes: number }>(
    `SELECT CAST(COALESCE(SUM(minutes), 0) AS INT) AS minutes FROM time_losses
      WHERE night_id = :nightId AND id <> :replacedId`,
    { nightId, replacedId: replacedId ?? 0 },
    tx,
  );
  const others = row?.minutes ?? 0;
  if (others + minutes <= minutesOfNight) return;
  throw new Fault('invalid-input', 'More time would be lost than the night has.', {
    issues: [
      {
        path: 'minutes',
        value: String(minutes),
        message: `is too long beside the ${others} minutes that are recorded as lost already`,
      },
    ],
  });
}

interface LossValues {
  readonly cause: LossCause;
  readonly minutes: number;
  readonly comment: string;
}
interface NewTimeLoss extends LossValues {
  readonly publicId: string;
  readonly nightId: number;
  readonly recordedById: number;
}

export async function insertTimeLoss(tx: Tx, loss: NewTimeLoss): Promise<void> {
  await insert(
    `INSERT INTO time_losses (public_id, night_id, cause, minutes, comment, recorded_by_id)
     VALUES (:publicId, :nightId, :cause, :minutes, :comment, :recordedById)`,
    { ...loss },
    tx,
  );
}

export async function updateTimeLoss(
  tx: Tx,
  id: number,
  { cause, minutes, comment }: LossValues,
): Promise<void> {
  await execute(
    'UPDATE time_losses SET cause = :cause, minutes = :minutes, comment = :comment WHERE id = :id',
    { id, cause, minutes, comment },
    tx,
  );
}

export async function deleteTimeLoss(tx: Tx, id: number): Promise<void> {
  await execute('DELETE FROM time_losses WHERE id = :id', { id }, tx);
}

/** An entry as the interface gives it. */
export const toTimeLoss = (row: TimeLossRow): TimeLoss => ({
  id: row.publicId,
  cause: row.cause,
  minutes: row.minutes,
  comment: row.comment,
  recorded_by: row.recordedBy,
});
