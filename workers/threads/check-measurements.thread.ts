import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { parentPort, workerData } from 'node:worker_threads';
import type { CheckMessage, CheckOrder } from './check-measurements/messages';
import { tableCheck } from './check-measurements/table-check';

/** Bytes that are read at once: rows of one piece live together, so this bounds memory. */
const piece = 128 * 1024;
/** Time between two messages about progress. [ms] */
const pause_ms = 250;

const send = (message: CheckMessage): void => parentPort?.postMessage(message);

/** Reads the original from its first byte to its last. The thread has nothing else to do, so it reads without waiting. */
function check(order: CheckOrder): void {
  const run = tableCheck(order, (slice) => send({ kind: 'slice', slice }));
  const descriptor = openSync(order.original, 'r');
  const { size } = fstatSync(descriptor);
  const buffer = Buffer.allocUnsafe(piece);
  let bytes = 0;
  let told = Date.now();
  for (;;) {
    const read = readSync(descriptor, buffer);
    if (read === 0) break;
    bytes += read;
    run.push(buffer.subarray(0, read));
    if (Date.now() - told < pause_ms) continue;
    told = Date.now();
    send({ kind: 'reading', bytes, size, rows: run.rows() });
  }
  closeSync(descriptor);
  const result = run.finish(() => send({ kind: 'matching', rows: run.rows() }));
  send({ kind: 'end', result });
}

check((workerData as { readonly order: CheckOrder }).order);
