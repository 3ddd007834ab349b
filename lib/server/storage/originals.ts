import 'server-only';
import { createHash, randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { mkdir, open, readdir, rename, rm, stat, type FileHandle } from 'node:fs/promises';
import path from 'node:path';
import { Readable } from 'node:stream';
import { Fault } from '@/lib/faults/fault';
import { environment } from '@/lib/server/settings/environment';

/** Originals lie under the SHA-256 of their bytes: the same bytes are kept once, and a name cannot lie about its content. */
const folder = (): string => path.join(environment().dataDir, 'originals');
const incomingName = 'incoming';
const incoming = (): string => path.join(folder(), incomingName);
const sha256Name = /^[0-9a-f]{64}$/;

export function originalPath(sha256: string): string {
  if (!sha256Name.test(sha256)) throw new Error('This is not the SHA-256 of an original.');
  return path.join(folder(), sha256.slice(0, 2), sha256);
}

export interface StoredOriginal {
  readonly sha256: string;
  /** [bytes] */
  readonly size: number;
}

/**
 * Takes a stream to disk while counting and hashing it: under a temporary name until its last byte, then under its hash.
 * Whatever ends early leaves nothing behind.
 */
export async function storeOriginal(
  stream: AsyncIterable<Uint8Array>,
  limit_bytes: number,
): Promise<StoredOriginal> {
  await mkdir(incoming(), { recursive: true });
  const temporary = path.join(incoming(), randomUUID());
  try {
    const stored = await write(stream, temporary, limit_bytes);
    await putInPlace(temporary, stored.sha256);
    return stored;
  } catch (error) {
    await rm(temporary, { force: true });
    throw toFault(error);
  }
}

async function write(
  stream: AsyncIterable<Uint8Array>,
  temporary: string,
  limit_bytes: number,
): Promise<StoredOriginal> {
  const hash = createHash('sha256');
  let size = 0;
  const file: FileHandle = await open(temporary, 'wx', 0o600);
  try {
    for await (const chunk of stream) {
      size += chunk.byteLength;
      if (size > limit_bytes) throw tooLarge(limit_bytes);
      hash.update(chunk);
      await file.writeFile(chunk);
    }
    // The name says that the bytes are there: after a power cut too.
    await file.datasync();
  } finally {
    await file.close();
  }
  if (size === 0) throw new Fault('invalid-input', 'The body is empty: there is no table in it.');
  return { sha256: hash.digest('hex'), size };
}

async function putInPlace(temporary: string, sha256: string): Promise<void> {
  const place = originalPath(sha256);
  await mkdir(path.dirname(place), { recursive: true });
  // Over a file of the same bytes nothing changes but its time, which keeps it from being removed as nobody's.
  await rename(temporary, place);
}

export const tooLarge = (limit_bytes: number): Fault =>
  new Fault(
    'too-large',
    `The file is larger than ${Math.floor(limit_bytes / 1024 / 1024)} MiB, which is the limit here.`,
  );

const noSpace = new Set(['ENOSPC', 'EDQUOT', 'EFBIG']);

/** A client that went away and a full disk are not bugs of ours. */
function toFault(error: unknown): unknown {
  const { code, name } = error as { code?: unknown; name?: unknown };
  if (typeof code === 'string' && noSpace.has(code)) {
    return new Fault(
      'unavailable',
      'There is no space left for the file. The observatory’s manager must make room.',
      {
        cause: error,
      },
    );
  }
  if (name === 'AbortError' || code === 'ECONNRESET' || code === 'ABORT_ERR') {
    return new Fault('invalid-input', 'The upload ended before the file was complete.', { cause: error });
  }
  return error;
}

/** The original's bytes, from the first to the last. One that is missing is an error before the first byte. */
export async function openOriginal(sha256: string): Promise<ReadableStream> {
  const place = originalPath(sha256);
  await stat(place);
  return Readable.toWeb(createReadStream(place)) as ReadableStream;
}

/** SHA-256 of the originals that were put in their place before an instant. */
export async function originalsBefore(instant: Date): Promise<readonly string[]> {
  const found: string[] = [];
  for (const part of await names(folder())) {
    if (part === incomingName) continue;
    for (const name of await names(path.join(folder(), part))) {
      if (sha256Name.test(name) && (await stat(originalPath(name))).mtime < instant) found.push(name);
    }
  }
  return found;
}

export const removeOriginal = (sha256: string): Promise<void> => rm(originalPath(sha256), { force: true });

/** Removes what uploads of processes that died have left; returns how much it was. */
export async function removeUnfinished(before: Date): Promise<number> {
  let removed = 0;
  for (const name of await names(incoming())) {
    const place = path.join(incoming(), name);
    const { mtime } = await stat(place);
    if (mtime >= before) continue;
    await rm(place, { force: true });
    removed += 1;
  }
  return removed;
}

async function names(place: string): Promise<readonly string[]> {
  try {
    return await readdir(place);
  } catch (error) {
    // Before the first upload there is no folder.
    if ((error as { code?: unknown }).code === 'ENOENT') return [];
    throw error;
  }
}
