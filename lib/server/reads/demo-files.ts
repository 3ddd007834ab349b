import 'server-only';
import { demoFiles, type DemoFile } from '@/lib/contracts/demo-files';
import type { Caller } from '@/lib/server/policy/caller';
import { demand } from '@/lib/server/policy/matrix';
import { environment } from '@/lib/server/settings/environment';
import { readDemoFile, sizeOfDemoFile } from '@/lib/server/storage/demo-files';

export interface OfferedFile extends DemoFile {
  readonly size_bytes: number;
}

/** The demo's sample tables that are there; null where no demo runs. */
export async function offeredDemoFiles(caller: Caller): Promise<readonly OfferedFile[] | null> {
  demand(caller, 'standards.see');
  if (!environment().isDemo) return null;
  const sizes = await Promise.all(demoFiles.map(({ name }) => sizeOfDemoFile(name)));
  return demoFiles.flatMap((file, index) => {
    const size_bytes = sizes[index] ?? null;
    return size_bytes === null ? [] : [{ ...file, size_bytes }];
  });
}

/** The bytes of one of them; null where no demo runs, and for every other name. */
export async function demoFile(caller: Caller, name: string): Promise<Buffer | null> {
  demand(caller, 'standards.see');
  if (!environment().isDemo || !demoFiles.some((file) => file.name === name)) return null;
  return readDemoFile(name);
}
