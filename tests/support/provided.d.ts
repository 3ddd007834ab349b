import type { DatabaseAddress } from '@/db/connection';

declare module 'vitest' {
  /** What the global setups tell the test files; read it with `inject('baseUrl')`. */
  interface ProvidedContext {
    /** integration: the databases that test files claim, one each. */
    readonly workerDatabases: readonly DatabaseAddress[];
    /** api, browser: address of the running application, without a slash at the end. */
    readonly baseUrl: string;
    /** api, browser: the database that the running application uses. */
    readonly servedDatabase: DatabaseAddress;
    /** api, browser: the running application's DATA_DIR. */
    readonly servedDataFolder: string;
    /** api, browser: password of every demo account. */
    readonly demoPassword: string;
  }
}
