import { spawn, type ChildProcess, type SpawnOptions } from 'node:child_process';

/** Programs that this process started and that still run: none outlives it, however it ends. */
const running = new Set<ChildProcess>();
process.once('exit', () => running.forEach((child) => child.kill('SIGKILL')));

export interface Child {
  readonly process: ChildProcess;
  /** What it wrote so far, both streams. */
  readonly output: () => string;
  /** Resolves when it has ended, with its exit code; null when a signal ended it. */
  readonly ended: Promise<number | null>;
}

/** Starts a program and keeps the end of what it writes, for the message when it fails. */
export function startChild(command: string, args: readonly string[], options: SpawnOptions = {}): Child {
  const child = spawn(command, args, { ...options, stdio: ['ignore', 'pipe', 'pipe'] });
  running.add(child);
  let output = '';
  const keep = (chunk: Buffer): void => {
    output = (output + chunk.toString('utf8')).slice(-100_000);
  };
  child.stdout?.on('data', keep);
  child.stderr?.on('data', keep);
  const ended = new Promise<number | null>((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code) => {
      running.delete(child);
      resolve(code);
    });
  });
  // Whoever awaits `ended` sees the failure; a program that nobody waits for must not end the test run.
  ended.catch(() => running.delete(child));
  return { process: child, output: () => output, ended };
}

/** Runs a program to its end; one that fails is an error with all it wrote. */
export async function runChild(
  command: string,
  args: readonly string[],
  options: SpawnOptions = {},
): Promise<string> {
  const child = startChild(command, args, options);
  const code = await child.ended;
  if (code !== 0) throw new Error(`${command} ${args.join(' ')} ended with ${code}:\n${child.output()}`);
  return child.output();
}

/** Asks a program to stop and waits until it has; after `patience_ms` it is ended by force. */
export async function stopChild(child: Child, patience_ms = 10_000): Promise<void> {
  const timer = setTimeout(() => child.process.kill('SIGKILL'), patience_ms);
  child.process.kill('SIGTERM');
  await child.ended;
  clearTimeout(timer);
}
