import type { oas31 } from 'zod-openapi';

/** A word of a type; a name of a schema is a link to it. */
export interface TypeWord {
  readonly text: string;
  readonly schema?: string;
}

type Schema = oas31.SchemaObject | oas31.ReferenceObject;
const word = (text: string): TypeWord => ({ text });

/** A schema's type in words: `number, 0 to 360, or null`, `Frame or list of Frame`. */
export function typeWords(schema: Schema): readonly TypeWord[] {
  if ('$ref' in schema && schema.$ref !== undefined) {
    const name = schema.$ref.slice(schema.$ref.lastIndexOf('/') + 1);
    return [{ text: name, schema: name }];
  }
  const own = schema as oas31.SchemaObject;
  const forms = own.anyOf ?? own.oneOf;
  if (forms)
    return forms.flatMap((form, index) => [...(index > 0 ? [word(' or ')] : []), ...typeWords(form)]);
  const types = [own.type ?? []].flat();
  const orNull = types.includes('null') ? [word(', or null')] : [];
  if (own.const !== undefined) return [word(JSON.stringify(own.const))];
  if (own.enum) return [word(choices(own.enum)), ...orNull];
  const [type] = types.filter((each) => each !== 'null');
  if (type === 'array')
    return [word('list of '), ...typeWords(own.items ?? {}), word(counts(own)), ...orNull];
  if (type === 'object') return [...objectWords(own), ...orNull];
  return [word(`${scalar(own, type)}${range(own)}`), ...orNull];
}

const choices = (values: readonly unknown[]): string =>
  values
    .filter((value) => value !== null)
    .map(String)
    .join(' · ');

/** An object without a name of its own by its fields; a page of a list by what it lists. */
function objectWords({ properties }: oas31.SchemaObject): readonly TypeWord[] {
  if (!properties) return [word('object')];
  const names = Object.keys(properties);
  const items = properties['items'];
  if (items && names.length === 2 && 'next' in properties) {
    return [word('{items: '), ...typeWords(items), word(', next}')];
  }
  return [word(`{${names.join(', ')}}`)];
}

function scalar(schema: oas31.SchemaObject, type: string | undefined): string {
  if (schema.format === 'date-time') return 'instant, ISO 8601 UTC with Z';
  if (schema.format === 'date') return 'date';
  if (schema.format === 'binary') return 'bytes';
  if (type === 'integer') return 'whole number';
  if (type === 'string') return 'text';
  return type ?? 'anything';
}

function range({
  minimum,
  maximum,
  exclusiveMinimum,
  exclusiveMaximum,
  maxLength,
}: oas31.SchemaObject): string {
  const low = exclusiveMinimum === undefined ? minimum : exclusiveMinimum;
  const high = exclusiveMaximum === undefined ? maximum : exclusiveMaximum;
  if (low !== undefined && high !== undefined) return `, ${String(low)} to ${String(high)}`;
  if (low !== undefined)
    return exclusiveMinimum === undefined ? `, from ${String(low)}` : `, above ${String(low)}`;
  if (high !== undefined) return `, up to ${String(high)}`;
  return maxLength === undefined ? '' : `, up to ${maxLength} characters`;
}

const counts = ({ minItems, maxItems }: oas31.SchemaObject): string =>
  maxItems === undefined ? '' : ` (${minItems ?? 0} to ${maxItems})`;
