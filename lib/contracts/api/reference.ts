import type { oas31 } from 'zod-openapi';
import { curlOf } from './curl-example';
import type { OpenApiDocument } from './openapi-document';
import { typeWords, type TypeWord } from './type-words';

/** One named value: a parameter, or a field of a body or an answer. */
export interface ReferenceField {
  readonly name: string;
  /** Where a parameter stands; empty for a field. */
  readonly in: string;
  readonly isRequired: boolean;
  readonly type: readonly TypeWord[];
  readonly description: string;
}
export interface ReferenceBody {
  readonly mediaTypes: readonly string[];
  readonly type: readonly TypeWord[];
  /** Of a body or answer without a name of its own. */
  readonly fields: readonly ReferenceField[];
}
export interface ReferenceOperation {
  readonly id: string;
  readonly method: string;
  readonly path: string;
  readonly summary: string;
  readonly description: string;
  readonly isOpen: boolean;
  readonly parameters: readonly ReferenceField[];
  readonly body: ReferenceBody | null;
  readonly answer: (ReferenceBody & { readonly status: string }) | null;
  readonly refusals: readonly number[];
  readonly curl: string;
  /** All of its words in lower case, for the search. */
  readonly words: string;
}
export interface ReferenceSection {
  readonly tag: string;
  readonly description: string;
  readonly operations: readonly ReferenceOperation[];
}
export interface ReferenceSchema {
  readonly name: string;
  readonly description: string;
  readonly fields: readonly ReferenceField[];
}
export interface Reference {
  readonly sections: readonly ReferenceSection[];
  readonly schemas: readonly ReferenceSchema[];
}

type Schema = oas31.SchemaObject | oas31.ReferenceObject;
const isReference = (schema: Schema): schema is oas31.ReferenceObject =>
  '$ref' in schema && schema.$ref !== undefined;

const methods = ['get', 'post', 'put', 'patch', 'delete'] as const;

/** The OpenAPI document as the reference page shows it. */
export function referenceOf(document: OpenApiDocument): Reference {
  const paths = Object.entries(document.paths ?? {}).sort(([a], [b]) => (a < b ? -1 : 1));
  const operations = paths.flatMap(([path, item]) =>
    methods.flatMap((method) => {
      const operation = item[method];
      return operation
        ? [{ tag: operation.tags?.[0] ?? '', operation: toOperation(document, path, method) }]
        : [];
    }),
  );
  const sections = (document.tags ?? []).map(({ name, description }) => ({
    tag: name,
    description: description ?? '',
    operations: operations.filter(({ tag }) => tag === name).map(({ operation }) => operation),
  }));
  const schemas = Object.entries(document.components?.schemas ?? {}).map(([name, schema]) => ({
    name,
    description: (!isReference(schema) && schema.description) || '',
    fields: fieldsOf(schema),
  }));
  return {
    sections: sections.filter((section) => section.operations.length > 0),
    schemas: schemas.sort((a, b) => (a.name < b.name ? -1 : 1)),
  };
}

function toOperation(
  document: OpenApiDocument,
  path: string,
  method: (typeof methods)[number],
): ReferenceOperation {
  const operation = document.paths?.[path]?.[method] ?? {};
  const parameters = (operation.parameters ?? []).flatMap((parameter): readonly ReferenceField[] =>
    '$ref' in parameter
      ? []
      : [
          {
            name: parameter.name,
            in: parameter.in,
            isRequired: parameter.required ?? false,
            type: typeWords(parameter.schema ?? {}),
            description: parameter.description ?? '',
          },
        ],
  );
  const request = operation.requestBody;
  const shown = {
    id: operation.operationId ?? '',
    method: method.toUpperCase(),
    path,
    summary: operation.summary ?? '',
    description: operation.description ?? '',
    isOpen: operation.security?.length === 0,
    parameters,
    body: request && !('$ref' in request) ? toBody(request.content) : null,
    answer: answerOf(operation.responses ?? {}),
    refusals: Object.keys(operation.responses ?? {})
      .map(Number)
      .filter((status) => status >= 400),
    curl: curlOf(document, path, method),
  };
  const names = [...parameters, ...(shown.body?.fields ?? []), ...(shown.answer?.fields ?? [])];
  const words = [shown.method, path, shown.summary, shown.description, operation.tags?.[0]];
  return { ...shown, words: [...words, ...names.map(({ name }) => name)].join(' ').toLowerCase() };
}

function answerOf(responses: oas31.ResponsesObject): ReferenceOperation['answer'] {
  const status = Object.keys(responses).find((key) => key.startsWith('2'));
  if (status === undefined) return null;
  const { content } = responses[status] as oas31.ResponseObject;
  return { status, ...(content ? toBody(content) : { mediaTypes: [], type: [], fields: [] }) };
}

function toBody(content: oas31.ContentObject): ReferenceBody {
  const schema = Object.values(content)[0]?.schema ?? {};
  return { mediaTypes: Object.keys(content), type: typeWords(schema), fields: fieldsOf(schema) };
}

function fieldsOf(schema: Schema): readonly ReferenceField[] {
  if (isReference(schema)) return [];
  return Object.entries(schema.properties ?? {}).map(([name, field]) => ({
    name,
    in: '',
    isRequired: schema.required?.includes(name) ?? false,
    type: typeWords(field),
    description: isReference(field) ? '' : ownDescription(field),
  }));
}

/** What a type says already is not said again. */
const ownDescription = ({ description = '' }: oas31.SchemaObject): string =>
  description === 'Instant, ISO 8601 UTC with Z' || description === 'Opaque identifier' ? '' : description;
