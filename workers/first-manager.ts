import { randomUUID } from 'node:crypto';
import { FirstManager } from '@/lib/contracts/people';
import { isFault } from '@/lib/faults/fault';
import { inviteFirstManager } from '@/lib/server/acts/invite-first-manager';

const usage = 'Usage: first-manager.ts EMAIL NAME [--another]';

/** Makes the first manager's account and prints the one-time link that sets its password. */
async function main(words: readonly string[]): Promise<number> {
  const isAnother = words.includes('--another');
  const [email, ...names] = words.filter((word) => word !== '--another');
  const parsed = FirstManager.safeParse({ email, name: names.join(' ') });
  if (!parsed.success) {
    console.error(usage);
    for (const issue of parsed.error.issues) console.error(`${issue.path.join('.')}: ${issue.message}`);
    return 2;
  }
  const caller = { kind: 'job', jobId: 'first-manager', personId: null, requestId: randomUUID() } as const;
  try {
    const { link } = await inviteFirstManager(caller, { ...parsed.data, isAnother });
    console.log(
      `${parsed.data.name} sets a password by this link, which works once and for 72 hours:\n${link}`,
    );
    return 0;
  } catch (error) {
    // A refusal is for the person at the terminal; anything else is a bug or an outage and shows its stack.
    if (!isFault(error)) throw error;
    console.error(error.message);
    return 1;
  }
}

// Ends with the pool still open: nothing waits in it.
process.exit(await main(process.argv.slice(2)));
