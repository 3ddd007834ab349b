/** Where an export comes from, as its first part says it. */
import type { CalibratedColumnWords } from '@/lib/contracts/calibrated-columns';

/** Facts in the order in which they are written; a list is written as lines of its own. */
export interface Provenance {
  readonly facts: Readonly<Record<string, string | number | null | readonly string[]>>;
  readonly columns: readonly CalibratedColumnWords[];
}

/**
 * Comment lines above a CSV table. Some spreadsheets part such a line at its commas too, so what follows one is kept from
 * being taken for a formula.
 */
export function provenanceLines({ facts, columns }: Provenance): string {
  const lines = Object.entries(facts).flatMap(([name, value]) =>
    typeof value === 'object' && value !== null
      ? [`${name}:`, ...value.map((one) => `  ${one}`)]
      : [`${name}: ${value ?? ''}`],
  );
  const meanings = columns.map(
    ({ name, unit, meaning }) => `  ${name}${unit === '' ? '' : ` [${unit}]`}: ${meaning}`,
  );
  return [...lines, 'columns:', ...meanings].map((line) => `# ${harmless(line)}\r\n`).join('');
}

const harmless = (line: string): string =>
  line
    .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
    .replaceAll('"', '\u2019')
    .replace(/([,;]\s*)(?=[=+\-\u2212@])/g, "$1'");

/** The beginning of a JSON export, up to the items. */
export function provenanceJson({ facts, columns }: Provenance): string {
  const described = columns.map(({ name, unit, meaning }) => ({ name, unit, meaning }));
  return `{"provenance":${JSON.stringify({ ...facts, columns: described }, null, 1)},\n"items":[\n`;
}
