import 'server-only';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import { execute, type Tx } from './database';

export interface NewMapping {
  readonly telescopeId: number;
  /** SHA-256 of the headers as they are compared. */
  readonly headerKey: string;
  readonly headers: readonly string[];
  readonly mapping: ColumnMapping;
  readonly savedById: number;
  readonly savedAt: Date;
}

/** Keeps a mapping in the place of an earlier one for the same headers. */
export async function saveMapping(tx: Tx, mapping: NewMapping): Promise<void> {
  await execute(
    `REPLACE INTO column_mappings (telescope_id, header_key, headers, mapping, saved_by_id, saved_at)
     VALUES (:telescopeId, :headerKey, :headers, :mapping, :savedById, :savedAt)`,
    { ...mapping, headers: JSON.stringify(mapping.headers), mapping: JSON.stringify(mapping.mapping) },
    tx,
  );
}
