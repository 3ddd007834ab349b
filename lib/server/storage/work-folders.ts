import 'server-only';
import { mkdir, mkdtemp, rm } from 'node:fs/promises';
import path from 'node:path';
import { environment } from '@/lib/server/settings/environment';

/** Runs work with an empty folder of its own beside the data, and removes the folder however the work ends. */
export async function withWorkFolder<T>(name: string, work: (folder: string) => Promise<T>): Promise<T> {
  const parent = path.join(environment().dataDir, 'work');
  await mkdir(parent, { recursive: true });
  const folder = await mkdtemp(path.join(parent, `${name}-`));
  try {
    return await work(folder);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
