import type { Refusal } from '@/app/_components/hooks/call-api';
import type { Queued } from '@/lib/contracts/api/measurement-set';
import type { ColumnMapping } from '@/lib/contracts/measurement-columns';
import type { MeasurementKind } from '@/lib/contracts/measurement-kinds';
import type { Issue } from '@/lib/faults/fault';

export interface TableToSend {
  readonly night: string;
  readonly file: File;
  readonly kind: MeasurementKind;
  readonly name: string;
  readonly tolerance: string;
  readonly mapping: ColumnMapping;
  /** Idempotency-Key: the same table sent again after a lost answer is taken once. */
  readonly key: string;
}

export type Sent =
  | { readonly kind: 'taken'; readonly queued: Queued }
  | { readonly kind: 'refused'; readonly refusal: Refusal }
  | { readonly kind: 'signed-out' }
  | { readonly kind: 'unreachable' }
  | { readonly kind: 'stopped' };

interface Problem {
  readonly detail?: string;
  readonly reference?: string;
  readonly errors?: readonly Issue[];
}

function addressOf({ night, file, kind, name, tolerance, mapping }: TableToSend): string {
  const query = new URLSearchParams({ kind, tolerance, file: file.name });
  if (name.trim() !== '') query.set('name', name.trim());
  if (Object.keys(mapping).length > 0) query.set('mapping', JSON.stringify(mapping));
  return `/api/v1/nights/${encodeURIComponent(night)}/measurements?${query.toString()}`;
}

function answerOf(request: XMLHttpRequest): Sent {
  if (request.status === 202) return { kind: 'taken', queued: JSON.parse(request.responseText) as Queued };
  if (request.status === 401) return { kind: 'signed-out' };
  const isProblem = request.getResponseHeader('content-type')?.includes('json') ?? false;
  const problem = isProblem ? (JSON.parse(request.responseText) as Problem) : {};
  return {
    kind: 'refused',
    refusal: {
      status: request.status,
      detail: problem.detail ?? `The server answered ${request.status}.`,
      issues: problem.errors ?? [],
      reference: request.status >= 500 ? problem.reference : undefined,
    },
  };
}

/**
 * Sends a table as it lies on the disk, and tells how far it is: `fetch` cannot say that of what it sends. The signal
 * stops it.
 */
export function sendTable(
  table: TableToSend,
  onProgress: (sent: number) => void,
  signal: AbortSignal,
): Promise<Sent> {
  return new Promise((resolve) => {
    const request = new XMLHttpRequest();
    request.open('POST', addressOf(table));
    request.setRequestHeader('content-type', 'text/csv');
    request.setRequestHeader('idempotency-key', table.key);
    request.upload.addEventListener('progress', ({ loaded }) => onProgress(loaded));
    request.addEventListener('load', () => resolve(answerOf(request)));
    request.addEventListener('error', () => resolve({ kind: 'unreachable' }));
    request.addEventListener('abort', () => resolve({ kind: 'stopped' }));
    signal.addEventListener('abort', () => request.abort(), { once: true });
    request.send(table.file);
  });
}
