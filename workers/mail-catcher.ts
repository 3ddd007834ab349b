import { logger } from '@/lib/server/log/logger';
import { environment } from '@/lib/server/settings/environment';
import { startMailCatcher } from './catch-mail';
import { stopOnSignal } from './stop-on-signal';

// The demo's SMTP server: mail goes no further than this machine. The start script runs it in demo mode only.
const { isDemo, mailCatcherPort, dataDir } = environment();
if (!isDemo || mailCatcherPort === null) {
  throw new Error('The mail catcher belongs to the demo: it needs EVENFALL_DEMO=1 and MAIL_CATCHER_PORT.');
}
const catcher = await startMailCatcher(mailCatcherPort, dataDir);
logger().info({ port: mailCatcherPort }, 'mail catcher started');
stopOnSignal(() => catcher.close());
