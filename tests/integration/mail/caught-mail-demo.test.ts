import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import MailComposer from 'nodemailer/lib/mail-composer';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { keepMail } from '@/lib/server/mail/caught-mails';
import type { PersonCaller } from '@/lib/server/policy/caller';
import { caughtMails, readCaughtMail } from '@/lib/server/reads/caught-mail';
import { faultOf } from '@/tests/support/fault-of';
import { newCaller } from '@/tests/support/people';

// The environment is read once in a process, so the demo has a file of tests to itself.
let folder = '';
let observer: PersonCaller;
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'evenfall-mail-'));
  Object.assign(process.env, { EVENFALL_DEMO: '1', DATA_DIR: folder });
  observer = await newCaller({ roles: ['observer'] });
});
afterAll(() => rm(folder, { recursive: true, force: true }));

describe('the mail page of the demo', () => {
  it('is empty before the first message, when the catcher has made no folder yet', async () => {
    expect(await caughtMails(observer)).toEqual({ mails: [], total: 0 });
  });

  it('lists what the catcher kept, the newest first, and shows one whole, for somebody without any office', async () => {
    const message = await new MailComposer({
      from: 'Evenfall <evenfall@localhost>',
      to: 'Noor Hathaway <observer@evenfall.example>',
      subject: 'Measurements of Thistle 3 wait',
      messageId: '<waiting-1@evenfall.example>',
      text: 'σ = 0.01 mag',
      html: '<p>σ = 0.01 mag</p>',
    })
      .compile()
      .build();
    const before = Date.now();
    await keepMail(folder, message);
    // Kept within one millisecond, two would have no order.
    await new Promise((resolve) => setTimeout(resolve, 5));
    await keepMail(folder, Buffer.from('X-Nothing: else\r\n\r\n'));

    const {
      mails: [bare, whole],
    } = await caughtMails(observer);
    expect(bare).toMatchObject({ to: '', subject: '' });
    expect(whole).toMatchObject({
      to: '"Noor Hathaway" <observer@evenfall.example>',
      subject: 'Measurements of Thistle 3 wait',
    });
    expect(whole?.receivedAt.getTime()).toBeGreaterThanOrEqual(before);
    const shown = await readCaughtMail(observer, whole?.id ?? '');
    expect(shown).toMatchObject({
      ...whole,
      from: '"Evenfall" <evenfall@localhost>',
      messageId: '<waiting-1@evenfall.example>',
      html: '<p>σ = 0.01 mag</p>',
    });
    expect(shown.text.trim()).toBe('σ = 0.01 mag');
    expect(shown.headers).toContain('Message-ID: <waiting-1@evenfall.example>');
  });

  it('shows a message without sender, text, HTML or Message-ID as one that lacks them', async () => {
    const {
      mails: [bare],
    } = await caughtMails(observer);
    const shown = await readCaughtMail(observer, bare?.id ?? '');
    expect(shown).toMatchObject({ from: '', to: '', subject: '', messageId: '', html: null });
    expect(shown.text.trim()).toBe('');
  });

  it.each(['1700000000000-aaaaaaaa', '../../etc/passwd'])('finds no message %s', async (id) => {
    expect((await faultOf(readCaughtMail(observer, id))).code).toBe('not-found');
  });

  it('the list stops at a hundred and says how many there are', async () => {
    for (let mail = 1; mail <= 101; mail += 1)
      await keepMail(folder, Buffer.from(`Subject: ${mail}\r\n\r\n`));
    const { mails, total } = await caughtMails(observer);
    expect(mails).toHaveLength(100);
    expect(total).toBeGreaterThan(100);
  });
});
