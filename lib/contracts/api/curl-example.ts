import type { oas31 } from 'zod-openapi';
import type { OpenApiDocument } from './openapi-document';

type Schema = oas31.SchemaObject | oas31.ReferenceObject;
type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** A call as one can paste it into a shell, with `$EVENFALL` for the address and `$TOKEN` for the token. */
export function curlOf(document: OpenApiDocument, path: string, method: Method): string {
  const operation = document.paths?.[path]?.[method] ?? {};
  const parameters = (operation.parameters ?? []).filter(
    (parameter): parameter is oas31.ParameterObject => !('$ref' in parameter),
  );
  const filled = path.replace(/\{(\w+)\}/g, (_, name: string) => {
    const parameter = parameters.find((each) => each.in === 'path' && each.name === name);
    return String(exampleOf(document, parameter?.schema ?? {}) ?? name);
  });
  const needed = parameters.filter((parameter) => parameter.in === 'query' && parameter.required === true);
  const query = needed
    .map(
      ({ name, schema }) => `${name}=${encodeURIComponent(String(exampleOf(document, schema ?? {}) ?? ''))}`,
    )
    .join('&');
  const address = `"$EVENFALL/api/v1${filled}${query === '' ? '' : `?${query}`}"`;
  const parts = [
    `curl ${method === 'get' ? '' : `-X ${method.toUpperCase()} `}${address}`,
    ...(operation.security?.length === 0 ? [] : ['-H "Authorization: Bearer $TOKEN"']),
    ...bodyParts(document, operation.requestBody),
    ...(Object.keys(operation.responses ?? {}).some((status) => isStream(operation.responses?.[status]))
      ? ['-N']
      : []),
  ];
  return parts.join(' \\\n  ');
}

const isStream = (response: unknown): boolean =>
  Object.keys((response as oas31.ResponseObject | undefined)?.content ?? {}).includes('text/event-stream');

function bodyParts(document: OpenApiDocument, body: oas31.OperationObject['requestBody']): readonly string[] {
  if (!body || '$ref' in body) return [];
  const [type, content] = Object.entries(body.content)[0] ?? [];
  if (type === undefined) return [];
  if (type !== 'application/json') return [`-H "Content-Type: ${type}"`, '--data-binary @table.csv'];
  const example = JSON.stringify(exampleOf(document, content?.schema ?? {})).replaceAll("'", `'\\''`);
  return ['-H "Content-Type: application/json"', `-d '${example}'`];
}

/** An example by the schema: its own, or one of its parts. Optional fields are left out, unless nothing is needed. */
function exampleOf(document: OpenApiDocument, schema: Schema): unknown {
  if ('$ref' in schema && schema.$ref !== undefined) {
    const target = document.components?.schemas?.[schema.$ref.slice(schema.$ref.lastIndexOf('/') + 1)];
    return target ? exampleOf(document, target) : undefined;
  }
  const own = schema as oas31.SchemaObject;
  if (own.example !== undefined) return own.example as unknown;
  if (own.enum) return own.enum[0] as unknown;
  const [form] = own.anyOf ?? own.oneOf ?? [];
  if (form) return exampleOf(document, form);
  const [type] = [own.type ?? []].flat();
  if (type === 'object') return objectExample(document, own);
  if (type === 'array') return [exampleOf(document, own.items ?? {})];
  if (type === 'integer' || type === 'number') return typeof own.minimum === 'number' ? own.minimum : 1;
  if (type === 'boolean') return true;
  return own.format === 'password' ? 'your password' : '…';
}

function objectExample(document: OpenApiDocument, schema: oas31.SchemaObject): Record<string, unknown> {
  const fields = Object.entries(schema.properties ?? {});
  const needed = fields.filter(([name]) => schema.required?.includes(name));
  const hasOnlyVersion = needed.every(([name]) => name === 'version');
  const shown = hasOnlyVersion
    ? [...fields.filter(([name]) => name !== 'version').slice(0, 1), ...needed]
    : needed;
  return Object.fromEntries(shown.map(([name, field]) => [name, exampleOf(document, field)]));
}
