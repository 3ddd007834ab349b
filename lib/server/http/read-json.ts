import 'server-only';
import { Fault } from '@/lib/faults/fault';

/** Enough for 5,000 frames with every field filled. */
const limit_bytes = 8 * 1024 * 1024;

/** The body's text, read no further than the limit. */
export async function readText(request: Request): Promise<string> {
  if (!request.body) return '';
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
    size += chunk.byteLength;
    if (size > limit_bytes) {
      throw new Fault(
        'too-large',
        `The body is larger than ${limit_bytes / 1024 / 1024} MiB. Send it in parts.`,
      );
    }
    chunks.push(chunk);
  }
  return Buffer.concat(chunks).toString('utf8');
}

/** A JSON body's value; an empty body is undefined. */
export function parseJson(text: string): unknown {
  if (text.trim() === '') return undefined;
  try {
    return JSON.parse(text) as unknown;
  } catch (cause) {
    // The parser's sentence names the position, which is what the sender needs.
    throw new Fault('invalid-input', `The body is not JSON: ${(cause as Error).message}.`, { cause });
  }
}
