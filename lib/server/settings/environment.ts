import 'server-only';
import path from 'node:path';
import { z } from 'zod';

const flag = z
  .enum(['0', '1', ''])
  .default('0')
  .transform((value) => value === '1');
const port = z.coerce.number().int().min(1).max(65_535);

const Environment = z
  .object({
    PORT: port.default(3000),
    BASE_URL: z.url().optional(),
    DATA_DIR: z.string().min(1).default('.data'),
    EVENFALL_DEMO: flag,
    SECURE_COOKIES: flag,
    SMTP_URL: z.url().optional(),
    MAIL_FROM: z.string().min(3).default('Evenfall <evenfall@localhost>'),
    MAIL_CATCHER_PORT: port.optional(),
    WORKER_CONCURRENCY: z.coerce.number().int().min(1).max(64).default(2),
    WORKER_IN_SERVER: z
      .enum(['0', '1'])
      .default('1')
      .transform((value) => value === '1'),
    UPLOAD_LIMIT_MB: z.coerce.number().int().min(1).default(1024),
  })
  .transform((env) => ({
    /** Address in links, without a slash at its end. */
    baseUrl: (env.BASE_URL ?? `http://127.0.0.1:${env.PORT}`).replace(/\/+$/, ''),
    dataDir: path.resolve(env.DATA_DIR),
    isDemo: env.EVENFALL_DEMO,
    secureCookies: env.SECURE_COOKIES,
    smtpUrl: env.SMTP_URL ?? null,
    mailFrom: env.MAIL_FROM,
    mailCatcherPort: env.MAIL_CATCHER_PORT ?? null,
    workerConcurrency: env.WORKER_CONCURRENCY,
    workerInServer: env.WORKER_IN_SERVER,
    uploadLimit_bytes: env.UPLOAD_LIMIT_MB * 1024 * 1024,
  }));
export type Environment = z.output<typeof Environment>;

let known: Environment | undefined;

/** What the environment says, checked once; a wrong variable is named. */
export function environment(): Environment {
  if (known) return known;
  const parsed = Environment.safeParse(process.env);
  if (!parsed.success) {
    const wrong = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The environment is not usable. ${wrong.join('; ')}`);
  }
  known = parsed.data;
  return known;
}
