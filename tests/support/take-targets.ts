import type { PersonCaller } from '@/lib/server/policy/caller';
import type { TargetNight } from './calibrated';
import { check, upload } from './measurements';

/** Uploads a table of targets and takes it. */
export async function takeTargets(
  observer: PersonCaller,
  night: TargetNight,
  content: string,
): Promise<string> {
  const { set } = await upload(observer, night.id, content, { kind: 'target' });
  const result = await check({ set, person: observer });
  if (result.state !== 'matched') throw new Error(`The table was refused: ${result.faults} faults.`);
  return set;
}
