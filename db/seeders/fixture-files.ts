import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { parse } from 'csv-parse/sync';

const folder = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../../fixtures');

/** Where a fixture lies. */
export const fixturePath = (name: string): string => path.join(folder, name);

/** A fixture table: one record a line, by the names in its header. */
export async function readTable<Column extends string>(
  name: string,
): Promise<readonly Readonly<Record<Column, string>>[]> {
  return parse(await readFile(fixturePath(name)), {
    columns: true,
    skip_empty_lines: true,
    comment: '#',
  }) as Record<Column, string>[];
}

/** A fixture in JSON. Its form is the reader's promise: fixtures are part of the program, not input. */
export async function readJson<Content>(name: string): Promise<Content> {
  return JSON.parse(await readFile(fixturePath(name), 'utf8')) as Content;
}
