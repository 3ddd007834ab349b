import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createTransport } from 'nodemailer';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { caughtIds, caughtMail, keepMail } from '@/lib/server/mail/caught-mails';
import { freePort } from '@/tests/support/free-port';
import { startMailCatcher } from '@/workers/catch-mail';

describe('the mail catcher', () => {
  let folder = '';
  beforeEach(async () => {
    folder = await mkdtemp(path.join(tmpdir(), 'evenfall-mail-'));
  });
  afterEach(() => rm(folder, { recursive: true, force: true }));

  it('keeps what is sent to it, also over a restart, and shows it parsed', async () => {
    const port = await freePort();
    const send = (subject: string): Promise<unknown> =>
      createTransport({ url: `smtp://127.0.0.1:${port}` }).sendMail({
        from: 'Evenfall <evenfall@localhost>',
        to: 'observer@evenfall.example',
        subject,
        text: 'σ = 0.01 mag',
        html: '<p>σ = 0.01 mag</p>',
      });
    for (const subject of ['First, café', 'Second']) {
      const catcher = await startMailCatcher(port, folder);
      await send(subject);
      await catcher.close();
    }
    const shown = await Promise.all((await caughtIds(folder)).map((id) => caughtMail(folder, id)));
    expect(shown.map((mail) => mail?.subject)).toEqual(['Second', 'First, café']);
    expect(shown[1]).toMatchObject({
      to: 'observer@evenfall.example',
      text: expect.stringContaining('σ') as string,
      html: expect.stringContaining('<p>σ') as string,
    });
  });

  it('keeps the newest two hundred', async () => {
    for (let n = 0; n < 205; n += 1) await keepMail(folder, Buffer.from(`Subject: ${n}\r\n\r\n`));
    const ids = await caughtIds(folder);
    expect(ids).toHaveLength(200);
    const subjects = await Promise.all(
      ids.map(async (id) => Number((await caughtMail(folder, id))?.subject)),
    );
    expect(Math.min(...subjects)).toBeGreaterThanOrEqual(4);
  });

  it('refuses a message that is too large, with the code for it, and keeps nothing of it', async () => {
    const port = await freePort();
    const catcher = await startMailCatcher(port, folder);
    const sent = createTransport({ url: `smtp://127.0.0.1:${port}` }).sendMail({
      from: 'a@evenfall.example',
      to: 'b@evenfall.example',
      text: 'x'.repeat(11 * 1024 * 1024),
    });
    await expect(sent).rejects.toMatchObject({ responseCode: 552 });
    await catcher.close();
    expect(await caughtIds(folder)).toEqual([]);
  });

  it('reads no file but its own', async () => {
    expect(await caughtMail(folder, '../../etc/passwd')).toBeNull();
    expect(await caughtMail(folder, '1700000000000-aaaaaaaa')).toBeNull();
  });
});
