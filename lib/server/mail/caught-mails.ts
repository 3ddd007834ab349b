import 'server-only';
import { randomBytes } from 'node:crypto';
import { mkdir, open, readdir, readFile, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import { simpleParser } from 'mailparser';

/** Messages that the demo's local catcher keeps: one file each, as received, the newest `kept` of them. */
const kept = 200;
const idForm = /^\d{13}-[0-9a-f]{8}$/;

const folderOf = (dataFolder: string): string => path.join(dataFolder, 'mail');

/** Writes a message so that it is whole or not there, also after a power cut, and lets the oldest go. */
export async function keepMail(dataFolder: string, message: Buffer): Promise<void> {
  const folder = folderOf(dataFolder);
  await mkdir(folder, { recursive: true, mode: 0o700 });
  const id = `${String(Date.now()).padStart(13, '0')}-${randomBytes(4).toString('hex')}`;
  const part = path.join(folder, `${id}.part`);
  const file = await open(part, 'wx', 0o600);
  try {
    await file.writeFile(message);
    await file.sync();
  } finally {
    await file.close();
  }
  await rename(part, path.join(folder, `${id}.eml`));
  const ids = await caughtIds(dataFolder);
  for (const old of ids.slice(kept)) await rm(path.join(folder, `${old}.eml`), { force: true });
}

/** Ids of the kept messages, the newest first. */
export async function caughtIds(dataFolder: string): Promise<readonly string[]> {
  try {
    const names = await readdir(folderOf(dataFolder));
    return names
      .filter((name) => name.endsWith('.eml') && idForm.test(name.slice(0, -4)))
      .map((name) => name.slice(0, -4))
      .sort()
      .reverse();
  } catch (error) {
    // The folder comes with the first message.
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return [];
    throw error;
  }
}

export interface CaughtMail {
  readonly id: string;
  readonly receivedAt: Date;
  readonly from: string;
  readonly to: string;
  readonly subject: string;
  readonly messageId: string;
  readonly text: string;
  readonly html: string | null;
  /** As received, in their order. */
  readonly headers: readonly string[];
}

/** A kept message, parsed; null when there is none of that id. */
export async function caughtMail(dataFolder: string, id: string): Promise<CaughtMail | null> {
  if (!idForm.test(id)) return null;
  const message = await readIfThere(path.join(folderOf(dataFolder), `${id}.eml`));
  if (!message) return null;
  const mail = await simpleParser(message, { skipImageLinks: true, skipTextToHtml: true });
  const to = Array.isArray(mail.to) ? mail.to.map((each) => each.text).join(', ') : (mail.to?.text ?? '');
  return {
    id,
    receivedAt: new Date(Number(id.slice(0, 13))),
    from: mail.from?.text ?? '',
    to,
    subject: mail.subject ?? '',
    messageId: mail.messageId ?? '',
    text: mail.text ?? '',
    html: mail.html || null,
    headers: mail.headerLines.map(({ line }) => line),
  };
}

async function readIfThere(file: string): Promise<Buffer | null> {
  try {
    return await readFile(file);
  } catch (error) {
    // The catcher may have let it go since its id was read.
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}
