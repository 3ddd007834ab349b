import { simpleParser, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { execute, inTransaction, select } from '@/lib/server/data/database';
import { postMail, type NewMail } from '@/lib/server/mail/post-mail';
import { emptyTables } from '@/tests/support/database';
import { freePort } from '@/tests/support/free-port';
import { jobNow, makeDue, makePerson, untilJob } from '@/tests/support/jobs';
import { handlers } from '@/workers/handlers';
import { startRunner, type Runner } from '@/workers/runner';

const received: ParsedMail[] = [];
const runners: Runner[] = [];
const servers: SMTPServer[] = [];
let port = 0;

/** An SMTP server that keeps what it takes; `answer` may refuse a recipient. */
async function listen(answer: (address: string) => Error | null = () => null): Promise<void> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onRcptTo: ({ address }, _session, done) => done(answer(address)),
    onData: (stream, _session, done) => {
      void simpleParser(stream).then((mail) => {
        received.push(mail);
        done();
      });
    },
  });
  servers.push(server);
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
}
const refusal = (code: number, text: string): Error => Object.assign(new Error(text), { responseCode: code });

function run(count = 1): void {
  for (let n = 0; n < count; n += 1)
    runners.push(startRunner({ handlers, concurrency: 1, poll_ms: 30, keep_ms: 50 }));
}

beforeAll(async () => {
  // Before anything asks for the environment, which is read once.
  port = await freePort();
  process.env['SMTP_URL'] = `smtp://127.0.0.1:${port}`;
});
beforeEach(async () => {
  await emptyTables();
  received.length = 0;
});
afterEach(async () => {
  await Promise.all(runners.splice(0).map((runner) => runner.stop(0)));
  await Promise.all(servers.splice(0).map((server) => new Promise<void>((done) => server.close(done))));
});

const mail: NewMail = {
  kind: 'upload-refused',
  dedupeKey: 'upload-refused:1',
  to: { personId: null, email: 'observer@evenfall.example', name: 'Noor Hathaway' },
  subject: 'Refused: café.csv',
  text: 'Dear Noor,\n\nσ = 0.01 mag\n',
  html: '<p>Dear Noor, σ = 0.01 mag</p>',
};
const post = (more: Partial<NewMail> = {}): Promise<{ id: string }> =>
  inTransaction((tx) => postMail(tx, { ...mail, ...more }));
const mails = () =>
  select<{ state: string; tries: number; error: string; messageId: string; text: string }>(
    'SELECT state, tries, last_error AS error, message_id AS messageId, text FROM mails ORDER BY id',
  );
const mailJob = async (): Promise<string> => {
  const [row] = await select<{ id: string }>(`SELECT public_id AS id FROM jobs WHERE kind = 'send-mail'`);
  return row?.id ?? '';
};
const containing = (text: string): string => expect.stringContaining(text) as string;

describe('a mail of the outbox', () => {
  it('is sent as it was written, in plain text and HTML, with the Message-ID that it was given', async () => {
    await listen();
    await post();
    run();
    await untilJob(await mailJob(), 'done');
    const [row] = await mails();
    expect(row).toMatchObject({ state: 'sent', tries: 1, error: '' });
    const [sent] = received;
    expect(sent).toMatchObject({ subject: 'Refused: café.csv', messageId: row?.messageId });
    expect(sent?.text).toContain('σ = 0.01 mag');
    expect(sent?.html).toContain('σ = 0.01 mag');
    expect(sent?.headers.get('auto-submitted')).toBe('auto-generated');
  });

  it('is not there when the change that causes it is undone', async () => {
    const undone = inTransaction(async (tx) => {
      await postMail(tx, mail);
      throw new Error('the change failed');
    });
    await expect(undone).rejects.toThrow('the change failed');
    expect(await mails()).toEqual([]);
    expect(await mailJob()).toBe('');
  });

  it('is written once for one cause, however often it is posted, also at the same time', async () => {
    const ids = await Promise.all([post(), post(), post({ subject: 'another' })]);
    expect(new Set(ids.map(({ id }) => id)).size).toBe(1);
    expect(await mails()).toHaveLength(1);
    expect(await select('SELECT id FROM jobs')).toHaveLength(1);
  });

  it('waits while the SMTP server is away and is sent exactly once when it is back, with several runners', async () => {
    await post();
    run(3);
    const job = await mailJob();
    await expect.poll(() => jobNow(job), { timeout: 5_000 }).toMatchObject({ state: 'queued', tries: 1 });
    expect(await mails()).toMatchObject([
      { state: 'queued', tries: 1, error: containing('could not be used') },
    ]);
    expect(await jobNow(job)).toMatchObject({ error: { code: 'unavailable' } });
    await listen();
    await makeDue(job);
    await untilJob(job, 'done');
    expect(await mails()).toMatchObject([{ state: 'sent', tries: 2, error: '' }]);
    await new Promise((resolve) => setTimeout(resolve, 200));
    expect(received).toHaveLength(1);
  });

  it('is tried again after a temporary refusal, under the same Message-ID', async () => {
    let isBusy = true;
    await listen(() => (isBusy ? refusal(451, '4.7.1 greylisted') : null));
    await post();
    run();
    const job = await mailJob();
    await expect.poll(() => jobNow(job), { timeout: 5_000 }).toMatchObject({ state: 'queued', tries: 1 });
    const [waiting] = await mails();
    expect(waiting).toMatchObject({ state: 'queued', error: containing('451') });
    isBusy = false;
    await makeDue(job);
    await untilJob(job, 'done');
    expect(received.map(({ messageId }) => messageId)).toEqual([waiting?.messageId]);
  });

  it('fails visibly after a permanent refusal, and is not tried again', async () => {
    await listen(() => refusal(550, '5.1.1 no such mailbox'));
    await post();
    run();
    const job = await untilJob(await mailJob(), 'failed');
    expect(job).toMatchObject({ tries: 1, error: { message: containing('550') } });
    expect(await mails()).toMatchObject([
      { state: 'failed', tries: 1, error: containing('no such mailbox') },
    ]);
    expect(received).toEqual([]);
  });

  it('is not sent again by a job that runs a second time', async () => {
    await listen();
    await post();
    run();
    const job = await mailJob();
    await untilJob(job, 'done');
    await execute(`UPDATE jobs SET state = 'queued' WHERE public_id = :job`, { job }, null);
    await expect.poll(() => jobNow(job), { timeout: 5_000 }).toMatchObject({ state: 'done', tries: 2 });
    expect(received).toHaveLength(1);
  });

  it('keeps no copy of a one-time link once it is sent', async () => {
    await listen();
    await post({ kind: 'invitation', text: 'http://127.0.0.1:3000/welcome/secret' });
    run();
    await untilJob(await mailJob(), 'done');
    expect(received[0]?.text).toContain('/welcome/secret');
    expect(await mails()).toMatchObject([{ state: 'sent', text: '' }]);
  });

  it('cannot carry headers of somebody else’s making', async () => {
    await listen();
    const person = await makePerson('Noor\r\nBcc: spy@evenfall.example\r\n Hathaway', 'observer');
    await post({
      to: { personId: person.personId, email: person.email, name: person.name },
      subject: 'Refused: a\r\nBcc: spy@evenfall.example\r\n\r\nbody',
    });
    run();
    await untilJob(await mailJob(), 'done');
    const [sent] = received;
    expect(sent?.bcc).toBeUndefined();
    expect(sent?.subject).toBe('Refused: a Bcc: spy@evenfall.example body');
    expect(sent?.to).toMatchObject({ value: [{ address: person.email }] });
  });

  it('is refused when its recipient is no address', async () => {
    const to = { personId: null, email: 'a@evenfall.example\r\nRCPT TO:<spy@evenfall.example>', name: '' };
    await expect(post({ to })).rejects.toThrow(/email/i);
    expect(await mails()).toEqual([]);
  });
});
