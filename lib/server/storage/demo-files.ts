import 'server-only';
import { mkdir, readFile, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { environment } from '@/lib/server/settings/environment';

/** Samples made for the night in progress lie with the data, the others with the program. Names come from a list of ours. */
const folders = (): readonly string[] => [
  path.join(environment().dataDir, 'demo-files'),
  path.join(process.cwd(), 'fixtures', 'uploads'),
];

/** Keeps a sample that was made for this installation. */
export async function keepDemoFile(name: string, content: string): Promise<void> {
  const [own = ''] = folders();
  await mkdir(own, { recursive: true });
  await writeFile(path.join(own, name), content);
}

const isMissing = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && error.code === 'ENOENT';

async function firstOf<T>(name: string, open: (file: string) => Promise<T>): Promise<T | null> {
  for (const folder of folders()) {
    try {
      // Else the build takes the whole project for files that may be opened here.
      return await open(path.join(/* turbopackIgnore: true */ folder, name));
    } catch (error) {
      // It lies in one of the folders, or nowhere: a short night in progress has fewer samples.
      if (!isMissing(error)) throw error;
    }
  }
  return null;
}

/** A sample's bytes; null when it is not there. */
export const readDemoFile = (name: string): Promise<Buffer | null> => firstOf(name, (file) => readFile(file));

/** A sample's size [bytes]; null when it is not there. */
export const sizeOfDemoFile = (name: string): Promise<number | null> =>
  firstOf(name, async (file) => (await stat(file)).size);
