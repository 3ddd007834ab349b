import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { openApiDocument } from '@/lib/contracts/api/openapi-document';
import { operations } from '@/lib/contracts/api/operations';
import { referenceOf } from '@/lib/contracts/api/reference';
import { sessionCookieName } from '@/lib/server/identity/sessions';

const api = fileURLToPath(new URL('../../../app/api/v1', import.meta.url));
const routeFiles = readdirSync(api, { recursive: true, encoding: 'utf8' }).filter((file) =>
  file.endsWith('route.ts'),
);
const document = openApiDocument();

interface Served {
  readonly call: string;
  /** The operation that the route passes to `endpoint`. */
  readonly operation: string;
}

/** What the route files serve, read as text: importing them would start the server's own modules. */
const served: readonly Served[] = routeFiles.flatMap((file) => {
  const text = readFileSync(path.join(api, file), 'utf8');
  const folder = path.dirname(file).replaceAll('[', '{').replaceAll(']', '}');
  return [...text.matchAll(/export const (\w+) = endpoint\(\s*(\w+)/g)].map(
    ([, method = '', operation = '']) => ({
      call: `${method.toLowerCase()} /${folder}`,
      operation,
    }),
  );
});

describe('the operations', () => {
  it('are those that the route files serve, each at its own path and method', () => {
    const declared = operations.map(({ method, path: at, id }) => ({
      call: `${method} ${at}`,
      operation: id,
    }));
    const byCall = (a: Served, b: Served): number => (a.call < b.call ? -1 : 1);
    expect([...declared].sort(byCall)).toEqual([...served].sort(byCall));
  });

  it('are served through the wrapper only', () => {
    const exported = routeFiles.flatMap((file) =>
      [
        ...readFileSync(path.join(api, file), 'utf8').matchAll(
          /^export (?:const|async function|function) (\w+)(.*)/gm,
        ),
      ]
        .filter(([, name = '']) => /^[A-Z]+$/.test(name))
        .map(([line]) => `${file}: ${line}`),
    );
    expect(exported.filter((line) => !line.includes('= endpoint('))).toEqual([]);
    expect(exported).toHaveLength(served.length);
  });

  it('have names of their own', () => {
    const ids = operations.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
  });
});

type Node = string | number | boolean | null | readonly Node[] | { readonly [key: string]: Node };
const nodes = (node: Node): readonly { readonly [key: string]: Node }[] => {
  if (typeof node !== 'object' || node === null) return [];
  if (Array.isArray(node)) return (node as readonly Node[]).flatMap(nodes);
  const object = node as { readonly [key: string]: Node };
  return [object, ...Object.values(object).flatMap(nodes)];
};
const plain = JSON.parse(JSON.stringify(document)) as { readonly [key: string]: Node };

describe('the OpenAPI document', () => {
  it('is of version 3.1 and describes every operation once', () => {
    expect(document.openapi).toBe('3.1.0');
    const described = Object.entries(document.paths ?? {}).flatMap(([at, item]) =>
      (['get', 'post', 'put', 'patch', 'delete'] as const).flatMap((method) =>
        item[method] ? [`${method} ${at} ${item[method].operationId}`] : [],
      ),
    );
    expect(described.sort()).toEqual(
      operations.map(({ method, path: at, id }) => `${method} ${at} ${id}`).sort(),
    );
  });

  it('leads nowhere that is not there', () => {
    const references = nodes(plain).flatMap(({ $ref }) => (typeof $ref === 'string' ? [$ref] : []));
    expect(references.length).toBeGreaterThan(20);
    for (const reference of new Set(references)) {
      const target = reference
        .replace('#/', '')
        .split('/')
        .reduce<Node | undefined>((node, key) => (node as Record<string, Node> | undefined)?.[key], plain);
      expect(target, reference).toBeDefined();
    }
  });

  it.each(operations.map((operation) => [operation.id, operation] as const))(
    '%s declares its path’s parameters, an answer, its refusals and a known subject',
    (_, operation) => {
      const described = document.paths?.[operation.path]?.[operation.method];
      const inPath = [...operation.path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      const parameters = (described?.parameters ?? []).flatMap((each) => ('$ref' in each ? [] : [each]));
      expect(parameters.filter((each) => each.in === 'path').map(({ name }) => name)).toEqual(inPath);
      expect(parameters.filter((each) => each.in === 'path').every(({ required }) => required === true)).toBe(
        true,
      );
      const statuses = Object.keys(described?.responses ?? {});
      expect(statuses.filter((status) => status.startsWith('2'))).toHaveLength(1);
      expect(statuses).toContain('503');
      expect(statuses.includes('401')).toBe(
        operation.open !== true || (operation.faults ?? []).includes('not-signed-in'),
      );
      expect(document.tags?.map(({ name }) => name)).toContain(operation.tag);
      expect(operation.summary.length).toBeGreaterThan(3);
    },
  );

  it('names the cookie that sessions have', () => {
    const { session } = document.components?.securitySchemes ?? {};
    expect(session).toMatchObject({ type: 'apiKey', in: 'cookie', name: sessionCookieName });
  });

  it('lets answers gain fields, and says of requests which fields there are', () => {
    const schemas = document.components?.schemas ?? {};
    expect(schemas['Night']).not.toHaveProperty('additionalProperties');
    expect(schemas['FrameInput']).toMatchObject({ additionalProperties: false });
  });

  it('writes a nullable value as one schema of two types, without the noise of the generator', () => {
    const text = JSON.stringify(document);
    expect(text).not.toContain('9007199254740991');
    expect(document.components?.schemas?.['Frame']).toMatchObject({
      properties: {
        airmass: { type: ['number', 'null'] },
        band: { type: ['string', 'null'], enum: ['U', 'B', 'V', 'R', 'I', null] },
      },
    });
  });
});

describe('the reference', () => {
  const reference = referenceOf(document);

  it('shows every operation under its subject, with a command that can be pasted', () => {
    const shown = reference.sections.flatMap((section) => section.operations);
    expect(shown.map(({ id }) => id).sort()).toEqual(operations.map(({ id }) => id).sort());
    const log = shown.find(({ id }) => id === 'logFrames');
    expect(log?.curl.split('\n')[0]).toBe('curl -X POST "$EVENFALL/api/v1/nights/3kq8v7m2t0xc/frames" \\');
    expect(log?.curl).toContain(`-d '{"type":"target","object":"Thistle 3"`);
    expect(log?.answer?.type.map(({ text }) => text).join('')).toBe('Frame or {items: list of Frame, next}');
    expect(shown.find(({ id }) => id === 'getHealth')).toMatchObject({ isOpen: true });
    expect(shown.find(({ id }) => id === 'getHealth')?.curl).not.toContain('Authorization');
  });

  it('links to forms that it shows', () => {
    const names = new Set(reference.schemas.map(({ name }) => name));
    const fields = [
      ...reference.sections.flatMap(({ operations: each }) =>
        each.flatMap(({ body, answer, parameters }) => [
          ...parameters.flatMap(({ type }) => type),
          ...(body?.type ?? []),
          ...(answer?.type ?? []),
        ]),
      ),
      ...reference.schemas.flatMap((schema) => schema.fields.flatMap(({ type }) => type)),
    ];
    const linked = fields.flatMap(({ schema }) => schema ?? []);
    expect(linked.length).toBeGreaterThan(30);
    expect(linked.filter((name) => !names.has(name))).toEqual([]);
  });
});
