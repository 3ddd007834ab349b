import 'server-only';
import { originalsInUse } from '@/lib/server/data/measurement-sets';
import type { JobCaller } from '@/lib/server/policy/caller';
import { originalsBefore, removeOriginal, removeUnfinished } from '@/lib/server/storage/originals';

/** An upload's file is in its place some moments before its set is in the database: a day is far beyond that. [ms] */
const grace_ms = 86_400_000;

/** Removes uploads that broke off when a process died, and originals that no set names; returns how many files. */
export async function removeStaleFiles(_caller: JobCaller, now: number): Promise<number> {
  const before = new Date(now - grace_ms);
  const old = await originalsBefore(before);
  const inUse = await originalsInUse(old);
  const nobodys = old.filter((sha256) => !inUse.has(sha256));
  for (const sha256 of nobodys) await removeOriginal(sha256);
  return nobodys.length + (await removeUnfinished(before));
}
