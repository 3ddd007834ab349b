'use client';

import { useState } from 'react';
import type { SavedMapping } from '@/lib/contracts/api/measurement-set';
import {
  columnPositions,
  guessMapping,
  headersKey,
  missingColumns,
  type ColumnMapping,
} from '@/lib/contracts/measurement-columns';
import { readHead, type TableHead } from './read-head';

export interface Columns {
  readonly file: File;
  /** Null where the file's beginning holds no header: the server will say why. */
  readonly head: TableHead | null;
  readonly mapping: ColumnMapping;
  /** Who said so, where the mapping was remembered. */
  readonly savedBy: string | null;
  /** Whether the person is shown the mapping. */
  readonly isShown: boolean;
  readonly isRemembered: boolean;
}

/** Whether the table can be read with this mapping. */
export const isComplete = ({ head, mapping }: Columns): boolean =>
  head === null || missingColumns(columnPositions(head.headers, mapping)).length === 0;

function columnsOf(file: File, head: TableHead | null, saved: readonly SavedMapping[]): Columns {
  const start = { file, head, savedBy: null, isShown: false, isRemembered: true };
  if (head === null) return { ...start, mapping: {} };
  const known = saved.find(({ headers }) => headersKey(headers) === headersKey(head.headers));
  if (known) return { ...start, mapping: known.mapping, savedBy: known.saved_by };
  const own = { ...start, mapping: {} };
  // What is guessed is shown: a guess that nobody has seen must not decide what a number means.
  return isComplete(own) ? own : { ...own, mapping: guessMapping(head.headers), isShown: true };
}

/** The chosen file, its first lines, and how its columns are read. */
export function useColumns(saved: readonly SavedMapping[]) {
  const [columns, setColumns] = useState<Columns | null>(null);
  const choose = async (file: File): Promise<Columns> => {
    const chosen = columnsOf(file, await readHead(file), saved);
    setColumns(chosen);
    return chosen;
  };
  const change = (patch: Partial<Columns>) =>
    setColumns((present) => (present === null ? null : { ...present, ...patch }));
  return { columns, choose, change, clear: () => setColumns(null) };
}
