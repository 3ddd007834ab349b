import { z } from 'zod';
import {
  createDocument,
  type oas31,
  type ZodOpenApiOperationObject,
  type ZodOpenApiResponsesObject,
} from 'zod-openapi';
import type { FaultCode } from '@/lib/faults/fault';
import type { Operation } from './operation';
import { operations } from './operations';
import { Problem, problems } from './problem';
import { tidySchema } from './tidy-schema';

export type OpenApiDocument = oas31.OpenAPIObject;

/** What the calls are about, in the order of the reference. */
const tags: Readonly<Record<string, string>> = {
  access: 'Tokens, and who you are',
  observatory: 'Telescopes and programmes',
  nights: 'One telescope, one local evening date, from noon to noon',
  frames: 'Exposures with their geometry at mid-exposure',
  conditions: 'The sky as somebody, or a sensor, saw it',
  remarks: 'Free text in the log',
  'time lost': 'Observing time lost, and to what',
  measurements: 'Uploaded tables of instrumental magnitudes',
  standards: 'Stars with published magnitudes on the standard system',
  solutions: 'Fits of a night’s standards: asked, proposed, decided',
  'calibrated magnitudes': 'Measurements of targets on the standard system',
  jobs: 'Work that the service does in its own time',
  service: 'The service itself',
};

const binary = { type: 'string', format: 'binary' } as const;
const idempotencyKey = z.object({
  'Idempotency-Key': z.string().max(255).optional().meta({
    description: 'Your own name for this write: sent again with it, it is done once and answered alike',
  }),
});

const takesKey = (operation: Operation): boolean =>
  operation.method !== 'get' && !operation.stream && !operation.secret;

/** The refusals that an operation can give: what follows from its form, and what it names. */
export function faultsOf(operation: Operation): readonly FaultCode[] {
  const codes = new Set<FaultCode>(operation.faults ?? []);
  if (operation.params || operation.query || operation.body || operation.raw) codes.add('invalid-input');
  if (!operation.open) codes.add('not-signed-in');
  if (operation.method !== 'get') codes.add('not-allowed');
  if (operation.body || operation.raw) codes.add('too-large');
  // A repeated Idempotency-Key: the first request still runs, or was another one.
  if (takesKey(operation)) codes.add('conflict').add('unprocessable');
  if (operation.params) codes.add('not-found');
  codes.add('unavailable');
  return [...codes].sort((a, b) => problems[a].status - problems[b].status);
}

/** Bytes as they are, or as the one file of a form. */
const contentOf = (types: readonly string[]) =>
  Object.fromEntries(
    types.map((type) => {
      const form = { type: 'object' as const, properties: { file: binary }, required: ['file'] };
      return [type, { schema: type === 'multipart/form-data' ? form : binary }] as const;
    }),
  );

function responses(operation: Operation): ZodOpenApiResponsesObject {
  const status = operation.status ?? (operation.answer || operation.stream ? 200 : 204);
  const found: ZodOpenApiResponsesObject = {
    [`${status}`]: {
      description: status === 202 ? 'Taken; a job does the work' : status === 204 ? 'Done' : 'The answer',
      ...(operation.stream
        ? { content: contentOf(operation.stream) }
        : operation.answer
          ? { content: { 'application/json': { schema: operation.answer } } }
          : {}),
    },
  };
  for (const code of faultsOf(operation)) {
    const { status: key, title, meaning } = problems[code];
    found[`${key}`] = {
      description: `${title}. ${meaning}`,
      content: { 'application/problem+json': { schema: Problem } },
    };
  }
  return {
    ...found,
    default: {
      description: 'Anything else went wrong on our side; `reference` finds it in the log.',
      content: { 'application/problem+json': { schema: Problem } },
    },
  };
}

function toOpenApi(operation: Operation): ZodOpenApiOperationObject {
  return {
    operationId: operation.id,
    tags: [operation.tag],
    summary: operation.summary,
    ...(operation.description ? { description: operation.description } : {}),
    ...(operation.open ? { security: [] } : {}),
    requestParams: {
      ...(operation.params ? { path: operation.params as z.ZodObject } : {}),
      ...(operation.query ? { query: operation.query as z.ZodObject } : {}),
      ...(takesKey(operation) ? { header: idempotencyKey } : {}),
    },
    ...(operation.raw
      ? { requestBody: { required: true, content: contentOf(operation.raw) } }
      : operation.body
        ? { requestBody: { required: true, content: { 'application/json': { schema: operation.body } } } }
        : {}),
    responses: responses(operation),
  };
}

/** The OpenAPI 3.1 document, made from the schemas that validate. */
export function openApiDocument(): OpenApiDocument {
  const paths: Record<string, Record<string, ZodOpenApiOperationObject>> = {};
  for (const each of operations) (paths[each.path] ??= {})[each.method] = toOpenApi(each);
  const document = createDocument(
    {
      openapi: '3.1.0',
      info: {
        title: 'Evenfall',
        version: '1.0.0',
        description:
          'Night log and photometric calibration of an observatory. Angles are degrees, times UTC, magnitudes mag, unless a description says otherwise.',
      },
      servers: [{ url: '/api/v1' }],
      security: [{ token: [] }, { session: [] }],
      tags: Object.entries(tags).map(([name, description]) => ({ name, description })),
      paths,
      components: {
        securitySchemes: {
          token: {
            type: 'http',
            scheme: 'bearer',
            description: 'An API token: POST /tokens, or the page “Your tokens”',
          },
          session: {
            type: 'apiKey',
            in: 'cookie',
            name: 'evenfall_session',
            description: 'What a browser holds after sign-in',
          },
        },
      },
    },
    { override },
  );
  return tidySchema(document as unknown as Parameters<typeof tidySchema>[0]) as unknown as OpenApiDocument;
}

/** An answer may gain fields within version 1, so nothing says that it has no others. */
const override = ({
  jsonSchema,
  io,
}: {
  jsonSchema: Record<string, unknown>;
  io: 'input' | 'output';
}): void => {
  if (io === 'output' && jsonSchema['additionalProperties'] === false)
    delete jsonSchema['additionalProperties'];
};
