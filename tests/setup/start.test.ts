import { existsSync } from 'node:fs';
import { mkdir, readFile, stat, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Child } from '@/tests/support/child';
import { root } from '@/tests/support/scripts';
import {
  ownCopy,
  processesOf,
  readyLine,
  runScript,
  signal,
  startScript,
  temporaryFolder,
  type Environment,
} from '@/tests/support/start-script';

type Copy = Awaited<ReturnType<typeof ownCopy>>;

const status = async (copy: Copy, page: string): Promise<number> =>
  (await fetch(`http://127.0.0.1:${copy.PORT}${page}`)).status;

const health = async (copy: Copy): Promise<unknown> =>
  (await fetch(`http://127.0.0.1:${copy.PORT}/api/v1/health`)).json();

const pageOf = async (address: string): Promise<string> => (await fetch(address)).text();

const stepsOf = (child: Child): readonly string[] =>
  child
    .output()
    .split('\n')
    .filter((line) => line.startsWith('· '))
    .map((line) => line.slice(2));

/** Starts a copy and waits until it is ready; whatever happens, it is stopped at the end of this file. */
const started: Child[] = [];
async function startCopy(args: readonly string[], env: Environment): Promise<{ child: Child; line: string }> {
  const child = startScript(args, env);
  started.push(child);
  return { child, line: await readyLine(child) };
}
afterAll(async () => {
  for (const child of started) if (child.process.exitCode === null) await signal(child, 'SIGTERM');
});

describe('two copies of the demo side by side', () => {
  let first: Copy, second: Copy;
  let one: Awaited<ReturnType<typeof startCopy>>, other: Awaited<ReturnType<typeof startCopy>>;
  beforeAll(async () => {
    [first, second] = [await ownCopy(), await ownCopy()];
    [one, other] = await Promise.all([
      startCopy([], first),
      startCopy([], { ...second, DEMO_PASSWORD: 'of my own' }),
    ]);
  });

  it('each end in one line with the address, the demo accounts and the password', () => {
    expect(one.line).toContain(`http://127.0.0.1:${first.PORT} `);
    expect(one.line).toContain(
      'manager@evenfall.example, photometrist@, photometrist2@, observer@, pi@, coinvestigator@',
    );
    expect(one.line).toContain('password: evenfall-demo');
    expect(other.line).toContain(`http://127.0.0.1:${second.PORT} `);
    expect(other.line).toContain('password: of my own');
  });

  it('answer each on its own port', async () => {
    for (const copy of [first, second]) {
      expect(await health(copy)).toMatchObject({ status: 'ok', database: 'ok' });
      expect(await status(copy, '/sign-in')).toBe(200);
    }
  });

  it('keep the generated password of the database to their owner', async () => {
    const { mode } = await stat(path.join(first.DATA_DIR, 'db-password'));
    expect(mode & 0o777).toBe(0o600);
    const passwords = await Promise.all(
      [first, second].map((copy) => readFile(path.join(copy.DATA_DIR, 'db-password'), 'utf8')),
    );
    expect(passwords[0]).toMatch(/^[\w-]{32}\n$/);
    expect(passwords[0]).not.toBe(passwords[1]);
  });

  it('run MariaDB for this machine only, and as root under an account without rights', async () => {
    const [mariadb = ''] = (await processesOf(first.DATA_DIR)).filter((name) => name.endsWith('mariadbd'));
    const pid = mariadb.split(' ')[0] ?? '';
    expect(await readFile(`/proc/${pid}/cmdline`, 'utf8')).toContain('--bind-address=127.0.0.1');
    const [, user] = /^Uid:\s+(\d+)/m.exec(await readFile(`/proc/${pid}/status`, 'utf8')) ?? [];
    expect(Number(user)).not.toBe(0);
  });

  it('stop by SIGTERM one at a time and in order, leaving no process and no harm to the other', async () => {
    expect(await signal(one.child, 'SIGTERM')).toBe(0);
    expect(stepsOf(one.child).slice(-4)).toEqual([
      'Asked to stop',
      'Stopped: app',
      'Stopped: mail-catcher',
      'Stopped: mariadb',
    ]);
    expect(await processesOf(first.DATA_DIR)).toEqual([]);
    expect(await health(second)).toMatchObject({ status: 'ok' });
    expect(await readFile(path.join(first.DATA_DIR, 'log/mariadb.log'), 'utf8')).toMatch(
      /Shutdown complete\s*$/,
    );
  });

  it('start again without a build, without a new database and in less than half a minute', async () => {
    const began = Date.now();
    one = await startCopy([], first);
    expect(Date.now() - began).toBeLessThan(30_000);
    const steps = stepsOf(one.child).join('\n');
    expect(steps).toContain('Starting MariaDB');
    expect(steps).not.toMatch(/Installing|Building|Making the database/);
  });

  it('clear away what a run left that was ended by force', async () => {
    await signal(one.child, 'SIGKILL');
    expect((await processesOf(first.DATA_DIR)).length).toBeGreaterThan(0);
    one = await startCopy([], first);
    expect(
      stepsOf(one.child).filter((step) => step.startsWith('An earlier run was ended by force')),
    ).toHaveLength(3);
    expect(await health(first)).toMatchObject({ status: 'ok' });
  });

  it('end with the log of a program that ended by itself, and stop the others', async () => {
    const pid = Number(await readFile(path.join(first.DATA_DIR, 'run/app.pid'), 'utf8'));
    process.kill(pid, 'SIGKILL');
    expect(await one.child.ended).toBe(1);
    expect(one.child.output()).toContain('app ended by itself');
    expect(await processesOf(first.DATA_DIR)).toEqual([]);
  });

  it('refuse to rebuild under the feet of the one that runs', async () => {
    const stamp = path.join(root, '.next/evenfall-sources');
    const built = await readFile(stamp, 'utf8');
    await writeFile(stamp, 'of other sources');
    try {
      const { code, output } = await runScript([], await ownCopy());
      expect(output).toContain(
        'another copy runs from this folder, and its sources changed since it was built',
      );
      expect(code).toBe(1);
    } finally {
      await writeFile(stamp, built);
    }
  });

  it('stop by Ctrl-C', async () => {
    expect(await signal(other.child, 'SIGINT')).toBe(0);
    expect(await processesOf(second.DATA_DIR)).toEqual([]);
  });
});

describe('a start for real use', () => {
  let copy: Copy;
  let link: string;
  let archive: string;
  beforeAll(async () => {
    copy = await ownCopy();
    archive = path.join(await temporaryFolder(), 'evenfall.tar');
  });

  it('has no account and says how to make the first manager', async () => {
    const { line } = await startCopy(['--no-demo'], copy);
    expect(line).toContain('no manager yet: run ./docker-free-start.sh first-manager EMAIL NAME');
    expect(line).not.toContain('password');
  });

  it('makes the first manager beside the running copy, by a link that opens once a password is chosen', async () => {
    const { code, output } = await runScript(['first-manager', 'ada@observatory.example', 'Ada Marsh'], copy);
    expect(code).toBe(0);
    link = /http:\/\/127\.0\.0\.1:\d+\/\S+/.exec(output)?.[0] ?? '';
    expect(link).toContain(`:${copy.PORT}/`);
    expect(await pageOf(link)).toContain('Welcome, Ada Marsh');
    expect(await pageOf(`${link}x`)).toContain('This link does not work');
  });

  it('is backed up while it runs', async () => {
    const originals = path.join(copy.DATA_DIR, 'originals');
    await mkdir(path.join(originals, 'ab'), { recursive: true });
    await mkdir(path.join(originals, 'incoming'), { recursive: true });
    await writeFile(path.join(originals, 'ab/whole'), 'byte for byte');
    await writeFile(path.join(originals, 'incoming/half'), 'byte');
    const { code, output } = await runScript(['backup', archive], copy);
    expect(output).toContain(`Backup written: ${archive}`);
    expect(code).toBe(0);
  });

  it('is restored into another data folder, with its people and files', async () => {
    const restored = await ownCopy();
    const { code } = await runScript(['restore', archive], restored);
    expect(code).toBe(0);
    const originals = path.join(restored.DATA_DIR, 'originals');
    expect(await readFile(path.join(originals, 'ab/whole'), 'utf8')).toBe('byte for byte');
    expect(existsSync(path.join(originals, 'incoming/half'))).toBe(false);
    const { line } = await startCopy(['--no-demo'], restored);
    expect(line).not.toContain('no manager yet');
    expect(await pageOf(link.replace(`:${copy.PORT}/`, `:${restored.PORT}/`))).toContain(
      'Welcome, Ada Marsh',
    );
  });

  it('does not let a backup replace data that are in use', async () => {
    const { code, output } = await runScript(['restore', archive], copy);
    expect(output).toContain('already runs on DATA_DIR');
    expect(code).toBe(1);
  });
});
