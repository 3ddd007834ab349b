import { SMTPServer, type SMTPServerDataStream } from 'smtp-server';
import { logger } from '@/lib/server/log/logger';
import { keepMail } from '@/lib/server/mail/caught-mails';

const limit_bytes = 10 * 1024 * 1024;

async function read(stream: SMTPServerDataStream): Promise<Buffer | null> {
  const chunks: Buffer[] = [];
  let size = 0;
  for await (const chunk of stream as AsyncIterable<Buffer>) {
    size += chunk.length;
    // The rest is read and dropped: the sender hears the refusal at the end.
    if (size <= limit_bytes) chunks.push(chunk);
  }
  return size <= limit_bytes ? Buffer.concat(chunks) : null;
}

/** Takes whatever mail is sent to this machine's loopback and keeps it for the demo's mail page; nothing leaves. */
export function startMailCatcher(port: number, dataFolder: string): Promise<{ close: () => Promise<void> }> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    size: limit_bytes,
    onData: (stream, _session, done) => {
      read(stream)
        .then((message) => message && keepMail(dataFolder, message).then(() => true))
        .then((isKept) =>
          done(isKept ? null : Object.assign(new Error('The message is too large.'), { responseCode: 552 })),
        )
        .catch((error: unknown) => {
          logger().error({ err: error }, 'a mail could not be kept');
          done(Object.assign(new Error('The message could not be kept; try again.'), { responseCode: 451 }));
        });
    },
  });
  server.on('error', (error) => logger().warn({ err: error }, 'mail catcher'));
  return new Promise((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      server.server.off('error', reject);
      resolve({ close: () => new Promise((closed) => server.close(() => closed())) });
    });
  });
}
