import { execFileSync, spawn } from 'node:child_process';
import { chmod, mkdir, writeFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { freePort } from '@/tests/support/free-port';
import {
  ownCopy,
  pathWith,
  runScript,
  temporaryFolder,
  type Environment,
} from '@/tests/support/start-script';

const isRoot = process.getuid?.() === 0;

/** Expects that a start ends with code 1 and says all of this. */
async function expectRefusal(
  env: Environment,
  says: readonly string[],
  args: readonly string[] = [],
): Promise<void> {
  const { code, output } = await runScript(args, { ...(await ownCopy()), ...env });
  for (const text of ['Evenfall cannot go on', ...says]) expect(output).toContain(text);
  expect(code).toBe(1);
}

/** A program that listens on a free port of this machine for as long as `work` runs. */
async function withListener(work: (port: string) => Promise<void>): Promise<void> {
  const port = await freePort();
  const server = createServer((socket) => socket.destroy());
  await new Promise<void>((resolve) => server.listen(port, '127.0.0.1', resolve));
  try {
    await work(String(port));
  } finally {
    server.close();
  }
}

describe('a start that cannot go on says why and what to do, when', () => {
  it('Node.js is missing', async () => {
    const PATH = await pathWith({ without: ['node', 'nodejs'] });
    await expectRefusal({ PATH }, ['Node.js is not installed', 'Install Node.js 20.9 or newer']);
  });

  it('Node.js is too old', async () => {
    const PATH = await pathWith({ standIns: { node: 'echo v18.19.0' } });
    await expectRefusal({ PATH }, ['Node.js is v18.19.0', 'needs 20.9 or newer']);
  });

  it('MariaDB is missing and the person is not root: with the exact line to ask for', async () => {
    const PATH = await pathWith({
      without: ['mariadb-install-db'],
      standIns: { id: 'echo 1000' },
    });
    await expectRefusal({ PATH }, [
      'MariaDB is not installed, and only an administrator can install it',
      'apt-get install --no-install-recommends mariadb-server-core mariadb-client',
    ]);
  });

  it.each(['0.0.0.0', '192.168.7.7', '::'])(
    'the demo is to listen on %s, beyond this machine',
    async (BIND) => {
      await expectRefusal({ BIND }, [`not on BIND=${BIND}`, '--no-demo']);
    },
  );

  it.each(['PORT', 'DB_PORT', 'MAIL_CATCHER_PORT'])('the port of %s is taken', async (name) => {
    await withListener((port) =>
      expectRefusal({ [name]: port }, [`port ${port} is taken`, `set ${name} to a free port`]),
    );
  });

  it.each([
    ['PORT', 'http'],
    ['DB_PORT', '70000'],
    ['MAIL_CATCHER_PORT', '0'],
  ])('%s is %s, which is no port', async (name, value) => {
    await expectRefusal({ [name]: value }, [
      `${name} is ${value}`,
      `Set ${name} to a number from 1 to 65535`,
    ]);
  });

  it('two of its ports are the same', async () => {
    await expectRefusal({ PORT: '4999', DB_PORT: '4999' }, ['must differ']);
  });

  it('EVENFALL_DEMO is neither 1 nor 0', async () => {
    await expectRefusal({ EVENFALL_DEMO: 'yes' }, ['EVENFALL_DEMO is yes', '1 or 0']);
  });

  it('the data folder cannot be made', async () => {
    const file = path.join(await temporaryFolder(), 'file');
    await writeFile(file, '');
    await expectRefusal({ DATA_DIR: `${file}/data` }, ['cannot be made or written', 'Set DATA_DIR']);
  });

  it.runIf(isRoot)('the database’s account cannot reach the data folder', async () => {
    const closed = await temporaryFolder();
    await chmod(closed, 0o700);
    await expectRefusal({ DATA_DIR: `${closed}/data` }, ['cannot enter DATA_DIR', 'others may pass through']);
  });

  it('the disk is full', async () => {
    const { folder, PATH, release } = await fullDisk();
    try {
      await expectRefusal({ DATA_DIR: folder, ...PATH }, [
        'the disk is full',
        'set DATA_DIR to a folder on another disk',
      ]);
    } finally {
      release();
    }
  });

  it('MariaDB cannot start: with the end of its log', async () => {
    const copy = await ownCopy();
    await mkdir(path.join(copy.DATA_DIR, 'db/mysql'), { recursive: true });
    await writeFile(path.join(copy.DATA_DIR, 'db/ibdata1'), 'not a table space');
    if (isRoot) execFileSync('chown', ['-R', 'mysql:', path.join(copy.DATA_DIR, 'db')]);
    await expectRefusal(copy, ['MariaDB did not start', 'the last lines of', 'InnoDB']);
  });

  it('the disk fills up while MariaDB starts', async () => {
    const PATH = await pathWith({
      standIns: {
        mariadbd:
          'echo "[ERROR] mariadbd: Error writing file (Errcode: 28 No space left on device)" >&2; exit 1',
      },
    });
    await expectRefusal({ PATH }, [
      'MariaDB did not start',
      'The disk is full: make room',
      'No space left on device',
    ]);
  });

  it('another copy runs on the same data folder', async () => {
    const copy = await ownCopy();
    await mkdir(copy.DATA_DIR);
    const hold = 'exec 9>"$0"; flock 9; echo held; exec sleep 60';
    const holder = spawn('bash', ['-c', hold, path.join(copy.DATA_DIR, 'lock')]);
    await new Promise((resolve) => holder.stdout.once('data', resolve));
    try {
      await expectRefusal(copy, ['already runs on DATA_DIR', 'for a second copy']);
    } finally {
      holder.kill();
    }
  });

  it.each([
    ['demo', ['--no-demo'], 'accounts have a known password'],
    ['real', [], 'where the demo does not belong'],
  ] as const)('the data folder is for %s use and the start is not', async (mode, args, says) => {
    const copy = await ownCopy();
    await mkdir(copy.DATA_DIR);
    await writeFile(path.join(copy.DATA_DIR, 'mode'), `${mode}\n`);
    await expectRefusal(copy, [says, 'DATA_DIR'], args);
  });

  it('the command is unknown: with the list of commands', async () => {
    await expectRefusal({}, ['destroy is not one of its commands', 'first-manager EMAIL NAME'], ['destroy']);
  });

  it('restore is given a file that is no backup', async () => {
    const file = path.join(await temporaryFolder(), 'notes.txt');
    await writeFile(file, 'not an archive');
    await expectRefusal({}, ['is not an archive that backup wrote'], ['restore', file]);
  });
});

describe('--help', () => {
  it('names every command and needs nothing of the machine', async () => {
    const { code, output } = await runScript(['--help'], { PATH: await pathWith({ without: ['node'] }) });
    for (const word of ['--no-demo', 'test', 'first-manager', 'backup', 'restore'])
      expect(output).toContain(word);
    expect(code).toBe(0);
  });
});

/** A data folder without room: a disk of one megabyte where one may be mounted, else a `df` that reports it. */
async function fullDisk(): Promise<{
  readonly folder: string;
  readonly PATH: Environment;
  readonly release: () => void;
}> {
  const folder = await temporaryFolder();
  try {
    execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=1m,mode=755', 'tmpfs', folder], { stdio: 'ignore' });
    return { folder, PATH: {}, release: () => execFileSync('umount', [folder]) };
  } catch {
    // Mounting is not permitted here.
    const df =
      'printf "Filesystem 1024-blocks Used Available Capacity Mounted\\ntmpfs 1024 1024 0 100%% /\\n"';
    return { folder, PATH: { PATH: await pathWith({ standIns: { df } }) }, release: () => undefined };
  }
}
