import { sendQueuedMail } from '@/lib/server/acts/send-queued-mail';
import { backOff_s } from '@/lib/server/jobs/back-off';
import { jobKinds } from '@/lib/server/jobs/kinds';
import type { Handler } from '../handler';

/** Sends one mail of the outbox. The job's own back-off brings it back when the SMTP server is away. */
export const sendMail: Handler<'send-mail'> = ({ caller, payload, attempt }) =>
  sendQueuedMail(
    caller,
    payload.mail,
    backOff_s(attempt, jobKinds['send-mail'].longestWait_s, () => 0.5),
  );
