import type { z } from 'zod';
import type { FaultCode } from '@/lib/faults/fault';

/**
 * One call of the HTTP interface, said once: the route validates with it, and the OpenAPI document is made from it.
 * `open` calls answer without sign-in. `raw` bodies are streamed to the handler unread; `stream` answers are written by it.
 */
export interface Operation<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Answer extends z.ZodType = z.ZodType,
> {
  readonly id: string;
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  /** Below /api/v1, parameters in braces. */
  readonly path: `/${string}`;
  readonly tag: string;
  readonly summary: string;
  readonly description?: string;
  readonly params?: Params;
  readonly query?: Query;
  readonly body?: Body;
  /** Media types of a body that is streamed, not parsed. */
  readonly raw?: readonly string[];
  readonly answer?: Answer;
  /** Media types of an answer that the handler streams. */
  readonly stream?: readonly string[];
  readonly status?: 200 | 201 | 202 | 204;
  readonly open?: boolean;
  /** Of an open call: it never asks who calls, so it answers where that cannot be found out either. */
  readonly anonymous?: boolean;
  /** Refusals beyond those that follow from the rest: bad input, no sign-in, no right, nothing there. */
  readonly faults?: readonly FaultCode[];
  /** The answer holds a secret: it is never kept for a repeated Idempotency-Key. */
  readonly secret?: boolean;
}

/** Keeps the literal types of an operation. */
export const operation = <const O extends Operation>(definition: O): O => definition;

type Parsed<T> = T extends z.ZodType ? z.output<T> : undefined;
export type ParamsOf<O extends Operation> = Parsed<O['params']>;
export type QueryOf<O extends Operation> = Parsed<O['query']>;
export type BodyOf<O extends Operation> = Parsed<O['body']>;
/** The same value as nobody may change it: what acts and reads return. */
type Frozen<T> = T extends readonly (infer Item)[]
  ? readonly Frozen<Item>[]
  : T extends object
    ? { readonly [Key in keyof T]: Frozen<T[Key]> }
    : T;
/** What a handler returns: the input side of the answer's schema, which strips what it does not name. */
export type AnswerOf<O extends Operation> = O['stream'] extends readonly string[]
  ? Response
  : O['answer'] extends z.ZodType
    ? Frozen<z.input<O['answer']>>
    : undefined;
