import { onTestFinished } from 'vitest';
import { startChild, stopChild, type Child } from './child';
import { root, script } from './scripts';

/** Starts a worker in a process of its own, on the test's database; it is stopped when the test has ended. */
export function startWorker(file = 'workers/main.ts', env: Readonly<Record<string, string>> = {}): Child {
  const child = startChild(process.execPath, script(file), { cwd: root, env: { ...process.env, ...env } });
  onTestFinished(() => stopChild(child));
  return child;
}
