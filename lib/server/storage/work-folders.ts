import 'server-only';
import { mkdir, mkdtemp, readdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { environment } from '@/lib/server/settings/environment';

/**
 * Runs work with an empty folder of its own beside the data, and removes the folder however the work ends. What an
 * earlier run of the same name has left, because its process died, is removed first.
 */
export async function withWorkFolder<T>(name: string, work: (folder: string) => Promise<T>): Promise<T> {
  const parent = path.join(environment().dataDir, 'work');
  await mkdir(parent, { recursive: true });
  const left = (await readdir(parent)).filter((entry) => entry.startsWith(`${name}-`));
  for (const entry of left) await rm(path.join(parent, entry), { recursive: true, force: true });
  const folder = await mkdtemp(path.join(parent, `${name}-`));
  try {
    return await work(folder);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
