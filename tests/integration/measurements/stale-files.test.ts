import { mkdirSync, utimesSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { beforeAll, expect, it } from 'vitest';
import { openNight } from '@/lib/server/acts/open-night';
import { removeStaleFiles } from '@/lib/server/acts/remove-stale-files';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { originalPath, storeOriginal } from '@/lib/server/storage/originals';
import { system } from '@/tests/support/jobs';
import { newCaller, newLogWorld } from '@/tests/support/log-world';
import { filesIn, removeOriginals, upload } from '@/tests/support/measurements';

removeOriginals();
let noor: PersonCaller;
beforeAll(async () => {
  await newLogWorld();
  noor = await newCaller('Noor Hathaway', { roles: ['observer'] });
});

async function* once(text: string): AsyncGenerator<Uint8Array> {
  yield await Promise.resolve(Buffer.from(text));
}

it('files that no set names are removed after a day, and nothing else is', async () => {
  const night = await openNight(noor, { telescope: 'larkspur', date: '2026-07-01' });
  await upload(noor, night.id, 'frame,star\n1,A\n');
  const [kept = ''] = await filesIn('originals');
  const nobodys = await storeOriginal(once('nobody has me'), 1000);
  const fresh = await storeOriginal(once('just now'), 1000);
  const incoming = path.join(path.dirname(path.dirname(originalPath(fresh.sha256))), 'incoming');
  mkdirSync(incoming, { recursive: true });
  for (const name of ['old', 'young']) writeFileSync(path.join(incoming, name), 'half');
  const yesterday = new Date(Date.now() - 90_000_000);
  const old = [originalPath(kept), originalPath(nobodys.sha256), path.join(incoming, 'old')];
  for (const file of old) utimesSync(file, yesterday, yesterday);

  expect(await removeStaleFiles(system, Date.now())).toBe(2);
  expect((await filesIn('originals')).toSorted()).toEqual([kept, fresh.sha256, 'young'].toSorted());
  expect(await removeStaleFiles(system, Date.now())).toBe(0);
});

it('a stream that is longer than the limit, or empty, is refused and leaves nothing behind', async () => {
  const before = await filesIn('originals');
  await expect(storeOriginal(once('x'.repeat(1001)), 1000)).rejects.toMatchObject({ code: 'too-large' });
  await expect(storeOriginal(once(''), 1000)).rejects.toMatchObject({ code: 'invalid-input' });
  expect(await filesIn('originals')).toEqual(before);
});
