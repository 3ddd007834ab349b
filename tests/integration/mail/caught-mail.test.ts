import { describe, expect, it } from 'vitest';
import { caughtMails, readCaughtMail } from '@/lib/server/reads/caught-mail';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller } from '@/tests/support/people';

describe('the mail page', () => {
  it('does not exist outside the demo, not even for managers', async () => {
    const manager = await newCaller({ roles: ['manager'] });
    expect((await faultOf(caughtMails(manager))).code).toBe('not-found');
    expect((await faultOf(readCaughtMail(manager, '1780000000000-0123abcd'))).code).toBe('not-found');
  });
});
