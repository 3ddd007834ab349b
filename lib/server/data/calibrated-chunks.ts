import 'server-only';
import { select } from './database';
import { rowArrays, type RowArray } from './row-arrays';

const quantities = ['v', 'b', 'bv', 'ub', 'vr', 'vi']
  .flatMap((name) => [name, `${name}_random`, `${name}_systematic`])
  .join(', ');
/** Rows that are in memory at a time: so few that they die young. With 2,000 the heap grew by 100 MiB before it was cleared. */
const chunk = 250;

/**
 * All stars of a result in chunks, each with its number first and then as lib/formats/calibrated-rows.ts reads them. Only
 * for results that the caller may see. A result that is done never changes, so chunks of different moments fit together.
 */
export async function* calibratedChunks(transformationId: number): AsyncGenerator<readonly RowArray[]> {
  let after = 0;
  for (;;) {
    const rows = await rowArrays(
      `SELECT star_no, star, ra, decl, n_u, n_b, n_v, n_r, n_i, ${quantities}, bjd_tdb, airmass, flags
         FROM calibrated_magnitudes WHERE transformation_id = ? AND star_no > ? ORDER BY star_no LIMIT ${chunk}`,
      [transformationId, after],
    );
    if (rows.length > 0) yield rows;
    if (rows.length < chunk) return;
    after = Number(rows.at(-1)?.[0]);
  }
}

/** Standards that a solution used in a night, by source. */
export async function standardsUsed(
  solution: string,
  nightId: number,
): Promise<readonly { readonly source: string; readonly names: string }[]> {
  return select(
    `SELECT e.citation AS source, GROUP_CONCAT(DISTINCT d.name ORDER BY d.name SEPARATOR '; ') AS names
       FROM solution_observations o JOIN solutions s ON s.id = o.solution_id JOIN frames f ON f.id = o.frame_id
       JOIN standard_stars d ON d.id = o.standard_id JOIN standard_sources e ON e.id = d.source_id
      WHERE s.public_id = :solution AND f.night_id = :nightId AND o.is_used GROUP BY e.id ORDER BY e.citation`,
    { solution, nightId },
  );
}
