import 'server-only';
import { selectOne, type Tx } from './database';

/** A night as mails and exports call it. */
export interface NightName {
  readonly publicId: string;
  /** Evening date. */
  readonly nightDate: string;
  readonly telescope: string;
  readonly telescopeName: string;
  readonly observatory: string;
  readonly siteName: string;
}

export async function nightById(nightId: number, tx: Tx | null = null): Promise<NightName> {
  const row = await selectOne<NightName>(
    `SELECT n.public_id AS publicId, DATE_FORMAT(n.date, '%Y-%m-%d') AS nightDate, t.code AS telescope,
            t.name AS telescopeName, o.name AS observatory, s.name AS siteName
       FROM nights n JOIN telescopes t ON t.id = n.telescope_id JOIN sites s ON s.id = t.site_id
       JOIN observatories o ON o.id = s.observatory_id
      WHERE n.id = :nightId`,
    { nightId },
    tx,
  );
  if (!row) throw new Error(`The night ${nightId} is gone from under its magnitudes.`);
  return row;
}
