import { z } from 'zod';
import type { FaultCode } from '@/lib/faults/fault';

/** What each refusal of the interface means to the caller; the pages of the reference and the document show it. */
export const problems = {
  'invalid-input': {
    status: 400,
    title: 'The input is not valid',
    meaning: 'Every fault found is in `errors`.',
  },
  'not-signed-in': {
    status: 401,
    title: 'Sign-in is needed',
    meaning: 'No session and no token, or one that has ended.',
  },
  'not-allowed': { status: 403, title: 'Not allowed', meaning: 'You may see this and may not do it.' },
  'not-found': { status: 404, title: 'Not found', meaning: 'There is nothing here that you may see.' },
  conflict: {
    status: 409,
    title: 'Conflict with the present state',
    meaning: '`detail` says what stands in the way and what to do.',
  },
  stale: {
    status: 412,
    title: 'Changed by somebody else meanwhile',
    meaning: 'The version sent is not the present one; `errors` holds the present values.',
  },
  'too-large': { status: 413, title: 'Too large', meaning: 'Send it in parts.' },
  unsupported: { status: 415, title: 'Not supported', meaning: 'This media type or form is not taken here.' },
  unprocessable: {
    status: 422,
    title: 'Cannot be processed',
    meaning: 'Well-formed, and still not possible.',
  },
  'too-many': {
    status: 429,
    title: 'Too many requests',
    meaning: 'Wait for the seconds that Retry-After names.',
  },
  unavailable: {
    status: 503,
    title: 'Not available just now',
    meaning: 'Nothing was changed; try again shortly.',
  },
} as const satisfies Record<FaultCode, { status: number; title: string; meaning: string }>;

export const ProblemError = z
  .object({
    path: z
      .string()
      .meta({ description: 'Field, dotted; in a list the item’s index first; empty for the whole' }),
    line: z.number().int().optional().meta({ description: 'Line in the file, from 1' }),
    column: z.string().optional().meta({ description: 'Column’s name in the file’s own spelling' }),
    value: z.string().optional(),
    message: z.string(),
    remedy: z.string().optional(),
  })
  .meta({ id: 'ProblemError', description: 'One thing wrong with an input' });

export const Problem = z
  .object({
    type: z.string().meta({ description: 'Which problem, as an address that explains it' }),
    title: z.string(),
    status: z.number().int(),
    detail: z.string(),
    reference: z
      .string()
      .meta({ description: 'The request’s id, also in X-Request-Id: name it when you ask for help' }),
    errors: z.array(ProblemError),
  })
  .meta({
    id: 'Problem',
    description: 'Problem details, RFC 9457',
    example: {
      type: '/api-reference#problem-invalid-input',
      title: 'The input is not valid',
      status: 400,
      detail: 'One thing is wrong with the body.',
      reference: '5f0c4a1e-6f0b-4a58-9a3e-0d6d3c1f7a21',
      errors: [{ path: '3.band', value: 'Q', message: 'must be one of U, B, V, R, I' }],
    },
  });
