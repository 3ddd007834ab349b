import 'server-only';
import { randomUUID } from 'node:crypto';
import { headers } from 'next/headers';
import { unstable_rethrow } from 'next/navigation';
import type { z } from 'zod';
import type { ActionResult } from '@/lib/contracts/action-result';
import { Fault } from '@/lib/faults/fault';
import { currentCaller } from '@/lib/server/identity/current-caller';
import type { PersonCaller, Visitor } from '@/lib/server/policy/caller';
import { demandSameOrigin } from './origin';
import { parseInput } from './parse-input';
import { toFault } from './problem';
import { visitorFrom } from './visitor';

type Work<S extends z.ZodType, Who, T> = (caller: Who, input: z.output<S>) => Promise<T>;

/**
 * The one way from a component to the server: a server action of a signed-in person, its input by schema, its errors as
 * values. Takes a plain object, or a form's data. Redirects pass through.
 */
export function action<S extends z.ZodType, T>(schema: S, work: Work<S, PersonCaller, T>) {
  return async (input: FormData | z.input<S>): Promise<ActionResult<T>> =>
    run(schema, input, async (value, requestId) => {
      const caller = await currentCaller();
      if (!caller)
        throw new Fault(
          'not-signed-in',
          'You are no longer signed in. Sign in again; nothing was lost here.',
        );
      return work({ ...caller, requestId }, value);
    });
}

/** The same for `useActionState`: the former result first, then the form's data. Works before scripts have loaded. */
export function formAction<S extends z.ZodType, T>(schema: S, work: Work<S, PersonCaller, T>) {
  const act = action(schema, work);
  return async (_former: ActionResult<T> | null, form: FormData): Promise<ActionResult<T>> => act(form);
}

/** For the door: sign-in and one-time links, where nobody is signed in yet. */
export function openFormAction<S extends z.ZodType, T>(schema: S, work: Work<S, Visitor, T>) {
  return async (_former: ActionResult<T> | null, form: FormData): Promise<ActionResult<T>> =>
    run(schema, form, async (value, requestId) => work(visitorFrom(await headers(), requestId), value));
}

async function run<S extends z.ZodType, T>(
  schema: S,
  input: unknown,
  work: (value: z.output<S>, requestId: string) => Promise<T>,
): Promise<ActionResult<T>> {
  const requestId = randomUUID();
  try {
    demandSameOrigin(await headers(), 'session');
    return { ok: true, value: await work(parseInput(schema, plain(input), 'form'), requestId) };
  } catch (error) {
    unstable_rethrow(error);
    const fault = toFault(error, requestId, 'action');
    return {
      ok: false,
      fault: {
        code: fault?.code ?? 'bug',
        detail: fault?.message ?? 'Something went wrong on our side. What you typed is still here.',
        issues: fault?.issues ?? [],
        reference: requestId,
        typed: typedText(input),
      },
    };
  }
}

const secretField = /password|repeated|token/i;

/** A form's text fields as they came; passwords and tokens do not travel back. */
function typedText(input: unknown): Readonly<Record<string, string>> {
  if (!(input instanceof FormData)) return {};
  const fields = [...input].filter(
    (field): field is [string, string] =>
      typeof field[1] === 'string' && !field[0].startsWith('$ACTION') && !secretField.test(field[0]),
  );
  return Object.fromEntries(fields);
}

/** A form's fields as an object; a name that stands more than once becomes a list. Next's own fields are left out. */
function plain(input: unknown): unknown {
  if (!(input instanceof FormData)) return input;
  const values: Record<string, FormDataEntryValue | FormDataEntryValue[]> = {};
  for (const name of new Set(input.keys())) {
    if (name.startsWith('$ACTION')) continue;
    const all = input.getAll(name);
    values[name] = all.length === 1 && all[0] !== undefined ? all[0] : all;
  }
  return values;
}
