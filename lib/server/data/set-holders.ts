import 'server-only';
import type { SolutionState } from '@/lib/contracts/api/solution';
import { Fault } from '@/lib/faults/fault';
import type { Scope } from '@/lib/server/policy/scope';
import { select, type Tx } from './database';
import { visibleNights } from './visible';

interface Holder {
  readonly publicId: string;
  readonly number: number;
  readonly state: SolutionState;
  readonly nightDate: string;
  readonly isOfOwnNight: 0 | 1;
  readonly isVisible: 0 | 1;
}

/** Solutions that keep a set in use, the oldest first. A joint one can be of another night, which is not everybody's to see. */
async function holdersOf(tx: Tx, scope: Scope, setId: number): Promise<readonly Holder[]> {
  const nights = visibleNights(scope);
  return select<Holder>(
    `SELECT s.public_id AS publicId, s.number, s.state, DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate,
            s.night_id = m.night_id AS isOfOwnNight, ${nights.sql} AS isVisible
       FROM solution_sets q
       JOIN measurement_sets m ON m.id = q.set_id
       JOIN solutions s ON s.id = q.solution_id
       JOIN nights n ON n.id = s.night_id
      WHERE q.set_id = :setId AND s.state IN ('proposed', 'approved', 'superseded') ORDER BY s.id`,
    { setId, ...nights.values },
    tx,
  );
}

function wordsOf({ number, state, nightDate, isOfOwnNight, isVisible }: Holder): string {
  if (Number(isVisible) !== 1) return 'a solution of another night';
  const night = Number(isOfOwnNight) === 1 ? '' : ` of the night of ${nightDate}`;
  return `solution ${number}${night} (${state})`;
}

/**
 * The refusal to change what a set holds while solutions stand on it: it names them, and says that they must be withdrawn
 * `before` what was asked for.
 */
export async function inUseFault(
  tx: Tx,
  scope: Scope,
  set: { readonly id: number; readonly name: string },
  before: string,
): Promise<Fault> {
  const holders = await holdersOf(tx, scope, set.id);
  const [stand, them] = holders.length > 1 ? ['stand', 'all of them'] : ['stands', 'it'];
  const names = holders.length === 0 ? 'a solution' : holders.map(wordsOf).join(' and ');
  return new Fault(
    'conflict',
    `The set “${set.name}” is in use: ${names} ${stand} on it. A photometrist must withdraw ${them} before ${before}.`,
    {
      issues: holders
        .filter(({ isVisible }) => Number(isVisible) === 1)
        .map(({ publicId, state }) => ({
          path: 'solution',
          value: publicId,
          message: `is ${state} and stands on the set`,
        })),
    },
  );
}
