'use client';

import { useRef, useState } from 'react';
import { newKey, type Refusal } from '@/app/_components/hooks/call-api';
import type { Queued } from '@/lib/contracts/api/measurement-set';
import { sendTable, type Sent, type TableToSend } from './send-table';

export type UploadState =
  | { readonly kind: 'idle' }
  /** `sent` of `size` bytes are with the server. */
  | { readonly kind: 'sending'; readonly sent: number; readonly size: number; readonly stop: () => void }
  | { readonly kind: 'taken'; readonly set: string; readonly name: string }
  | { readonly kind: 'failed'; readonly refusal: Refusal };

const said = (detail: string): Refusal => ({ status: 0, detail, issues: [], reference: undefined });
const failures = {
  'signed-out': said(
    'You are no longer signed in. Sign in again in another tab, then upload again: the form stays.',
  ),
  unreachable: said('The link broke before the table was with the server. Nothing was taken; upload again.'),
  stopped: said('Stopped. Nothing of the table was taken.'),
} as const;

const refusalOf = (sent: Exclude<Sent, { kind: 'taken' }>): Refusal =>
  sent.kind === 'refused' ? sent.refusal : failures[sent.kind];

function isSame(one: Omit<TableToSend, 'key'>, other: Omit<TableToSend, 'key'>): boolean {
  const words = ({ file: _, ...rest }: Omit<TableToSend, 'key'>): string => JSON.stringify(rest);
  return one.file === other.file && words(one) === words(other);
}

/** Sends a table once at a time; a second press while one is under way does nothing. */
export function useUpload() {
  const [state, setState] = useState<UploadState>({ kind: 'idle' });
  const busy = useRef(false);
  /** The last sending: the same again, after a lost link, goes under the same key. */
  const last = useRef<{ readonly table: Omit<TableToSend, 'key'>; readonly key: string } | null>(null);

  const upload = async (table: Omit<TableToSend, 'key'>): Promise<Queued | null> => {
    if (busy.current) return null;
    busy.current = true;
    const stopping = new AbortController();
    const size = table.file.size;
    const tell = (sent: number) => setState({ kind: 'sending', sent, size, stop: () => stopping.abort() });
    tell(0);
    const key = last.current && isSame(last.current.table, table) ? last.current.key : newKey();
    last.current = { table, key };
    const sent = await sendTable({ ...table, key }, tell, stopping.signal);
    busy.current = false;
    if (sent.kind === 'taken') {
      last.current = null;
      setState({ kind: 'taken', set: sent.queued.set, name: table.name.trim() || table.file.name });
      return sent.queued;
    }
    if (sent.kind !== 'unreachable') last.current = null;
    setState({ kind: 'failed', refusal: refusalOf(sent) });
    return null;
  };
  const refuse = (detail: string) => setState({ kind: 'failed', refusal: said(detail) });
  return { state, upload, refuse, clear: () => setState({ kind: 'idle' }) };
}
