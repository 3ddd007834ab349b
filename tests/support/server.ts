import { existsSync } from 'node:fs';
import path from 'node:path';
import type { DatabaseAddress } from '@/db/connection';
import { startChild, stopChild, type Child } from './child';
import { databaseEnvironment } from './environment';
import { freePort } from './free-port';
import { root } from './scripts';

/** The built application, running. */
export interface RunningApplication {
  readonly baseUrl: string;
  readonly child: Child;
  readonly stop: () => Promise<void>;
}

export interface ApplicationOptions {
  readonly database: DatabaseAddress;
  readonly dataFolder: string;
  /** Further environment variables, which win over the ones set here. */
  readonly env?: Readonly<Record<string, string>>;
}

async function waitUntilHealthy(baseUrl: string, child: Child): Promise<void> {
  const deadline = Date.now() + 60_000;
  for (;;) {
    try {
      const answer = await fetch(`${baseUrl}/api/v1/health`);
      if (answer.ok) return;
    } catch {
      // Nobody listens yet; the loop ends by the deadline or by the program's end.
    }
    if (child.process.exitCode !== null || Date.now() > deadline)
      throw new Error(`The application did not start:\n${child.output()}`);
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

/** Starts the built application on a free port, as the start script does, and waits until it is healthy. */
export async function startApplication(options: ApplicationOptions): Promise<RunningApplication> {
  if (!existsSync(path.join(root, '.next/BUILD_ID')))
    throw new Error('The application is not built. Run `npm run build` first.');
  const port = await freePort();
  const baseUrl = `http://127.0.0.1:${port}`;
  const next = path.join(root, 'node_modules/next/dist/bin/next');
  const child = startChild(process.execPath, [next, 'start', '-H', '127.0.0.1', '-p', String(port)], {
    cwd: root,
    env: {
      ...process.env,
      NODE_ENV: 'production',
      NEXT_MANUAL_SIG_HANDLE: '1',
      NEXT_TELEMETRY_DISABLED: '1',
      ...databaseEnvironment(options.database),
      DATA_DIR: options.dataFolder,
      PORT: String(port),
      BIND: '127.0.0.1',
      BASE_URL: baseUrl,
      // Where nobody listens: a test's mail goes nowhere unless the test says where.
      SMTP_URL: 'smtp://127.0.0.1:9',
      ...options.env,
    },
  });
  await waitUntilHealthy(baseUrl, child);
  return { baseUrl, child, stop: () => stopChild(child) };
}
