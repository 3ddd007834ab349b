import 'server-only';
import { mostNights } from '@/lib/contracts/solve-options';
import type { Scope } from '@/lib/server/policy/scope';
import { select } from './database';
import type { NightRow } from './nights';
import type { Epoch } from './solve-inputs';
import { visibleNights } from './visible';

interface JoinableNightRow {
  readonly publicId: string;
  readonly date: string;
  readonly nObservations: number;
}

/**
 * Further nights in the scope that can be solved with one: of its telescope and equipment epoch, with matched standards,
 * the nearest in time first. The counts are those of their sets: rows that were matched.
 */
export async function joinableNights(
  scope: Scope,
  { night, epoch }: { readonly night: NightRow; readonly epoch: Epoch | null },
): Promise<readonly JoinableNightRow[]> {
  const nights = visibleNights(scope);
  const rows = await select<JoinableNightRow>(
    `SELECT n.public_id AS publicId, DATE_FORMAT(n.date, '%Y-%m-%d') AS date,
            CAST(SUM(m.n_matched) AS INT) AS nObservations
       FROM nights n
       JOIN measurement_sets m ON m.night_id = n.id AND m.kind IN ('standard', 'mixed')
        AND m.state IN ('matched', 'in use') AND m.n_matched > 0
      WHERE n.telescope_id = :telescopeId AND n.id <> :nightId AND ${nights.sql}
        AND (SELECT e.id FROM equipment_epochs e
              WHERE e.telescope_id = n.telescope_id AND e.starts_on <= n.date
                AND (e.ends_on IS NULL OR e.ends_on > n.date)
              ORDER BY e.starts_on DESC LIMIT 1) <=> :epochId
      GROUP BY n.id ORDER BY ABS(DATEDIFF(n.date, :date)), n.date LIMIT :limit`,
    {
      telescopeId: night.telescopeId,
      nightId: night.id,
      date: night.date,
      epochId: epoch?.id ?? null,
      limit: mostNights - 1,
      ...nights.values,
    },
  );
  return rows.map((row) => ({ ...row, nObservations: Number(row.nObservations) }));
}
