import 'server-only';
import { Readable } from 'node:stream';
import { Busboy, type BusboyInstance } from '@fastify/busboy';
import { Fault } from '@/lib/faults/fault';
import { environment } from '@/lib/server/settings/environment';
import { tooLarge } from '@/lib/server/storage/originals';

/** A file as it comes in: nothing of it has been read. */
export interface UploadBody {
  /** Null when the body brings none. */
  readonly fileName: string | null;
  readonly contentType: string;
  readonly bytes: AsyncIterable<Uint8Array>;
}

const takes =
  'Send the table as the body with Content-Type text/csv, or as multipart/form-data with one part “file”.';

/** The one file of a request: its body, or the part `file` of a form. Never the whole of it in memory. */
export async function uploadBody(request: Request): Promise<UploadBody> {
  const [type = '', ...parameters] = (request.headers.get('content-type') ?? '').toLowerCase().split(';');
  const limit_bytes = environment().uploadLimit_bytes;
  if (Number(request.headers.get('content-length') ?? '0') > limit_bytes + formOverhead_bytes) {
    throw tooLarge(limit_bytes);
  }
  if (!request.body) throw new Fault('invalid-input', 'The body is empty: there is no table in it.');
  const bytes = request.body as unknown as AsyncIterable<Uint8Array>;
  switch (type.trim()) {
    case 'text/csv':
      demandUtf8(parameters);
      return { fileName: null, contentType: 'text/csv', bytes };
    case 'multipart/form-data':
      return fileOfForm(bytes, request.headers.get('content-type') ?? '');
    case 'application/fits':
    case 'image/fits':
      throw new Fault(
        'unsupported',
        `FITS binary tables are not taken here yet: export the table as CSV. ${takes}`,
      );
    default:
      throw new Fault(
        'unsupported',
        `${type === '' ? 'The body has no Content-Type' : `${type.trim()} is not taken here`}. ${takes}`,
      );
  }
}

/** What a form adds to its file: boundaries, headers and small fields. */
const formOverhead_bytes = 64 * 1024;

function demandUtf8(parameters: readonly string[]): void {
  const charset = parameters.map((one) => /^\s*charset\s*=\s*"?([^"]*)"?\s*$/.exec(one)?.[1]).find(Boolean);
  if (charset === undefined || charset === 'utf-8' || charset === 'utf8' || charset === 'us-ascii') return;
  throw new Fault('unsupported', `A table in ${charset} is not taken here: send it in UTF-8.`);
}

/** Waits for the part `file` and gives its bytes as they arrive; they end well only when the whole form does. */
async function fileOfForm(body: AsyncIterable<Uint8Array>, contentType: string): Promise<UploadBody> {
  const form = startForm(contentType);
  const source = Readable.from(body, { objectMode: false });
  return new Promise<UploadBody>((resolve, reject) => {
    let found: Readable | null = null;
    const whole = new Promise<void>((done, broken) => {
      const fail = (cause: unknown): void => {
        const fault = toFault(cause);
        broken(fault);
        reject(fault);
        found?.destroy(fault);
        source.destroy();
      };
      form.on('file', (field, stream, fileName) => {
        if (field !== 'file') {
          stream.resume();
        } else if (found) {
          stream.resume();
          fail(new Fault('invalid-input', 'The form holds more than one file. Send one table at a time.'));
        } else {
          found = stream;
          resolve({
            fileName: fileName || null,
            contentType: 'text/csv',
            bytes: bytesOf({ stream, source, whole }),
          });
        }
      });
      form.once('finish', () => {
        done();
        reject(new Fault('invalid-input', 'The form has no part “file”.'));
      });
      form.once('error', fail);
      source.once('error', fail);
    });
    // Whoever reads the bytes hears of it; when nobody does yet, the refusal above says it.
    whole.catch(() => undefined);
    source.pipe(form);
  });
}

interface FormFile {
  readonly stream: Readable;
  readonly source: Readable;
  readonly whole: Promise<void>;
}

async function* bytesOf({ stream, source, whole }: FormFile): AsyncGenerator<Uint8Array> {
  try {
    yield* stream as AsyncIterable<Uint8Array>;
    await whole;
  } finally {
    // Whoever stops reading early wants no more of the form either.
    source.destroy();
  }
}

function startForm(contentType: string): BusboyInstance {
  try {
    return new Busboy({
      headers: { 'content-type': contentType },
      limits: { fieldSize: 1024, fields: 20, headerPairs: 100 },
    });
  } catch (cause) {
    // A form without a boundary cannot be read at all.
    throw new Fault('invalid-input', `The form cannot be read: ${(cause as Error).message}.`, { cause });
  }
}

function toFault(cause: unknown): Fault {
  if (cause instanceof Fault) return cause;
  return new Fault('invalid-input', 'The form broke off before its end.', { cause });
}
