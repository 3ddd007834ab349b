/**
 * The one error that rules and borders speak: a stable code, a sentence for the person, and, for bad input, every
 * issue found. Anything else that is thrown is a bug or an outage and reaches people only as a reference number.
 */
export const faultCodes = [
  'invalid-input',
  'not-signed-in',
  'not-allowed',
  'not-found',
  'conflict',
  'stale',
  'too-large',
  'too-many',
  'unsupported',
  'unprocessable',
  'unavailable',
] as const;
export type FaultCode = (typeof faultCodes)[number];

/** One thing wrong with an input: where it stands, what was found there and what to do about it. */
export interface Issue {
  /** Field or column, dotted for nested input; empty for the input as a whole. */
  readonly path: string;
  /** Line in the file as an editor counts it, from 1. */
  readonly line?: number;
  /** Column's name in the file's own spelling. */
  readonly column?: string;
  readonly value?: string;
  readonly message: string;
  readonly remedy?: string;
}

export interface FaultOptions {
  readonly issues?: readonly Issue[];
  /** Seconds after which the same request may succeed. */
  readonly retryAfter_s?: number;
  readonly cause?: unknown;
}

export class Fault extends Error {
  readonly code: FaultCode;
  readonly issues: readonly Issue[];
  readonly retryAfter_s: number | undefined;

  constructor(code: FaultCode, detail: string, options: FaultOptions = {}) {
    super(detail, options.cause === undefined ? undefined : { cause: options.cause });
    this.name = 'Fault';
    this.code = code;
    this.issues = options.issues ?? [];
    this.retryAfter_s = options.retryAfter_s;
  }
}

/** By name, not by class: a bundler may hold this module twice in one process. */
export function isFault(error: unknown, code?: FaultCode): error is Fault {
  if (!(error instanceof Error) || error.name !== 'Fault') return false;
  return code === undefined || (error as Fault).code === code;
}
