import 'server-only';
import type { Band } from '@/lib/contracts/bands';
import { select } from './database';

interface BandExtinction {
  readonly band: Band;
  readonly mean: number;
  readonly scatter: number;
  readonly n: number;
}

/**
 * First-order extinction of a telescope's other nights by their approved solutions: mean and night-to-night scatter. A
 * night whose extinction was held at a value says nothing of it. Two nights at least, or there is no scatter.
 */
export async function extinctionHistory(
  telescopeId: number,
  exceptNightId: number,
): Promise<Readonly<Partial<Record<Band, Omit<BandExtinction, 'band'>>>>> {
  const rows = await select<BandExtinction>(
    `SELECT b.band, AVG(k.value) AS mean, STDDEV_SAMP(k.value) AS scatter, COUNT(*) AS n
       FROM solutions s
       JOIN nights n ON n.id = s.night_id
       JOIN solution_bands b ON b.solution_id = s.id AND b.night_id = s.night_id
       JOIN solution_coefficients k ON k.solution_band_id = b.id
      WHERE s.state = 'approved' AND n.telescope_id = :telescopeId AND s.night_id <> :exceptNightId
        AND k.name = 'extinction' AND k.status <> 'fixed' AND k.value IS NOT NULL
      GROUP BY b.band HAVING COUNT(*) > 1`,
    { telescopeId, exceptNightId },
  );
  return Object.fromEntries(
    rows.map(({ band, mean, scatter, n }) => [band, { mean, scatter, n: Number(n) }]),
  );
}
