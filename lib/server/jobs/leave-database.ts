import 'server-only';
import { closeDatabase } from '@/lib/server/data/database';

/** Closes this process's connections; call it when nothing more will ask for one. */
export const leaveDatabase = (): Promise<void> => closeDatabase();
