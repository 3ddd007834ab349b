import 'server-only';
import { createTransport, type Transporter } from 'nodemailer';
import { environment } from '@/lib/server/settings/environment';

/** A server that does not answer within these is away; the mail waits for the next try. */
const timeouts = { connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 30_000 };

let known: { readonly url: string; readonly transport: Transporter } | undefined;

/** The way to the SMTP server of SMTP_URL. Null when there is none: mails then wait in the outbox. */
export function mailTransport(): Transporter | null {
  const url = environment().smtpUrl;
  if (url === null) return null;
  // In clear text to this machine only: elsewhere the server's certificate must be good, or the address says smtps.
  if (known?.url !== url) known = { url, transport: createTransport({ url, ...timeouts }) };
  return known.transport;
}

export interface SmtpFailure {
  /** The server said no for good: trying again would bring the same answer. */
  readonly isPermanent: boolean;
  /** What went wrong, fit for the mails page: no addresses with passwords, one line. */
  readonly reason: string;
}

/** What nodemailer's error means for the mail. */
export function smtpFailure(error: unknown): SmtpFailure {
  const { code, responseCode, response, message } = error as {
    code?: string;
    responseCode?: number;
    response?: string;
    message?: string;
  };
  if (responseCode !== undefined) {
    // 5xx to the message or its recipient is final; to the sign-in or the greeting it is a fault of the settings.
    const isPermanent = responseCode >= 500 && (code === 'EENVELOPE' || code === 'EMESSAGE');
    return { isPermanent, reason: `The mail server answered: ${response ?? responseCode}` };
  }
  return {
    isPermanent: false,
    reason: `The mail server could not be used (${code ?? message ?? 'unknown error'}).`,
  };
}
