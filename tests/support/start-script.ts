import { existsSync } from 'node:fs';
import { chmod, mkdir, mkdtemp, readdir, readFile, rm, symlink, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { startChild, type Child } from './child';
import { freePort } from './free-port';
import { root } from './scripts';

export type Environment = Readonly<Record<string, string>>;

/** What one run of the start script left behind. */
export interface Outcome {
  readonly code: number | null;
  readonly output: string;
}

const folders: string[] = [];

/** A folder that the script and the database's account may both use; short, and gone after the test file. */
export async function temporaryFolder(): Promise<string> {
  const folder = await mkdtemp('/tmp/evenfall-setup-');
  folders.push(folder);
  await chmod(folder, 0o755);
  return folder;
}

/** Removes every folder that this test file made. */
export async function removeTemporaryFolders(): Promise<void> {
  for (const folder of folders.splice(0)) await rm(folder, { recursive: true, force: true });
}

/** Settings of a copy of its own: a new data folder and free ports. */
export async function ownCopy(): Promise<{
  readonly PORT: string;
  readonly DB_PORT: string;
  readonly MAIL_CATCHER_PORT: string;
  readonly DATA_DIR: string;
}> {
  return {
    PORT: String(await freePort()),
    DB_PORT: String(await freePort()),
    MAIL_CATCHER_PORT: String(await freePort()),
    DATA_DIR: path.join(await temporaryFolder(), 'data'),
  };
}

const inherited = ['PATH', 'HOME', 'LANG', 'TZ', 'CI', 'USER'];

/** Starts the script with nothing of this environment but what every shell has. */
export function startScript(args: readonly string[], env: Environment): Child {
  if (!existsSync(path.join(root, 'node_modules/.evenfall-installed')))
    throw new Error(
      'These tests run in a folder that ./docker-free-start.sh has set up: run it with `test` once.',
    );
  // Node's types want NODE_ENV in every environment; the script's has none.
  const base = Object.fromEntries(
    inherited.flatMap((name) => (process.env[name] === undefined ? [] : [[name, process.env[name]]])),
  ) as NodeJS.ProcessEnv;
  return startChild(path.join(root, 'docker-free-start.sh'), args, { cwd: '/', env: { ...base, ...env } });
}

/** Runs the script to its end. */
export async function runScript(args: readonly string[], env: Environment): Promise<Outcome> {
  const child = startScript(args, env);
  return { code: await child.ended, output: child.output() };
}

/** Waits for the one line that a start ends with, and returns it. */
export async function readyLine(child: Child): Promise<string> {
  for (;;) {
    const line = /^Evenfall is ready .*$/m.exec(child.output());
    if (line) return line[0];
    if (child.process.exitCode !== null)
      throw new Error(`The start ended without being ready:\n${child.output()}`);
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

/** Sends a signal and waits for the script's end. */
export async function signal(child: Child, name: NodeJS.Signals): Promise<number | null> {
  child.process.kill(name);
  return child.ended;
}

/** Processes that were started for a data folder, as `number name`, from the environment that they carry. */
export async function processesOf(dataFolder: string): Promise<readonly string[]> {
  const found: string[] = [];
  for (const pid of (await readdir('/proc')).filter((name) => /^\d+$/.test(name))) {
    try {
      const environment = await readFile(`/proc/${pid}/environ`, 'utf8');
      if (!environment.split('\0').includes(`DATA_DIR=${dataFolder}`)) continue;
      found.push(`${pid} ${(await readFile(`/proc/${pid}/comm`, 'utf8')).trim()}`);
    } catch {
      // It ended while we looked, or belongs to somebody else: not ours in either case.
    }
  }
  return found;
}

/**
 * A PATH with every program of this machine but the named ones, and with stand-ins for some: the way to see what the
 * script does on a machine that lacks or has something.
 */
export async function pathWith(options: {
  readonly without?: readonly string[];
  /** Name → text of a shell script. */
  readonly standIns?: Readonly<Record<string, string>>;
}): Promise<string> {
  const folder = path.join(await temporaryFolder(), 'bin');
  await mkdir(folder);
  const standIns = options.standIns ?? {};
  for (const [name, text] of Object.entries(standIns))
    await writeFile(path.join(folder, name), `#!/bin/sh\n${text}\n`, { mode: 0o755 });
  const left = new Set([...(options.without ?? []), ...Object.keys(standIns)]);
  for (const source of (process.env['PATH'] ?? '').split(':').filter((entry) => existsSync(entry)))
    for (const name of await readdir(source)) {
      if (left.has(name)) continue;
      left.add(name);
      await symlink(path.join(source, name), path.join(folder, name));
    }
  return folder;
}
