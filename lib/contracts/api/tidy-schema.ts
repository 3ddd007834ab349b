/** A piece of a JSON document. */
type Json = string | number | boolean | null | undefined | readonly Json[] | { readonly [key: string]: Json };
type JsonObject = Readonly<Record<string, Json>>;

const isObject = (value: Json): value is JsonObject =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** Keys whose values are names to schemas, or examples: what looks like a keyword in them is data. */
const namesToSchemas = new Set(['properties', 'patternProperties', 'schemas']);
const data = new Set(['example', 'examples', 'default', 'enum', 'const']);

/**
 * The document in fewer words that say the same: a nullable value as one schema of two types, formats without the
 * pattern that spells them out, whole numbers without the bounds of double precision.
 */
export function tidySchema(node: Json): Json {
  if (Array.isArray(node)) return (node as readonly Json[]).map(tidySchema);
  if (!isObject(node)) return node;
  const entries = Object.entries(node).map(([key, value]): [string, Json] => {
    if (data.has(key)) return [key, value];
    if (namesToSchemas.has(key) && isObject(value)) {
      return [
        key,
        Object.fromEntries(Object.entries(value).map(([name, schema]) => [name, tidySchema(schema)])),
      ];
    }
    return [key, tidySchema(value)];
  });
  return nullableAsOne(withoutNoise(Object.fromEntries(entries)));
}

function withoutNoise(schema: JsonObject): JsonObject {
  return Object.fromEntries(
    Object.entries(schema).filter(([key, value]) => {
      if (key === 'pattern') return schema['format'] !== 'date-time' && schema['format'] !== 'date';
      if (key === 'minimum') return value !== Number.MIN_SAFE_INTEGER;
      if (key === 'maximum') return value !== Number.MAX_SAFE_INTEGER;
      return true;
    }),
  );
}

function nullableAsOne(schema: JsonObject): JsonObject {
  const { anyOf, ...rest } = schema;
  if (!Array.isArray(anyOf) || anyOf.length !== 2) return schema;
  const forms = (anyOf as readonly Json[]).filter(isObject);
  const value = forms.find(({ type }) => type !== 'null');
  if (!forms.some(({ type }) => type === 'null') || typeof value?.['type'] !== 'string') return schema;
  const choices = Array.isArray(value['enum']) ? { enum: [...(value['enum'] as readonly Json[]), null] } : {};
  return { ...value, ...choices, type: [value['type'], 'null'], ...rest };
}
