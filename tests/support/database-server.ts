import { chown, mkdir, mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { createConnection, type Connection } from 'mariadb';
import type { DatabaseAddress } from '@/db/connection';
import { runChild, startChild, stopChild, type Child } from './child';
import { freePort } from './free-port';

/** A private MariaDB with throw-away data. */
export interface DatabaseServer {
  readonly port: number;
  /** A connection with every right. */
  readonly administrator: () => Promise<Connection>;
  /** Makes an empty database and tells how to reach it. */
  readonly createDatabase: (name: string) => Promise<DatabaseAddress>;
  readonly address: (name: string) => DatabaseAddress;
  /** Stops it as an administrator would; the data stay. */
  readonly halt: () => Promise<void>;
  /** Starts it again on the same port and data. */
  readonly resume: () => Promise<void>;
  /** Stops it and removes its data. */
  readonly dispose: () => Promise<void>;
}

const account = { user: 'evenfall', password: 'only for tests' };
const path_ = `${process.env['PATH'] ?? ''}:/usr/sbin:/usr/local/sbin`;
const env = { ...process.env, PATH: path_ };
const isRoot = process.getuid?.() === 0;
const asUser = isRoot ? ['--user=mysql'] : [];

async function giveToMysql(folder: string): Promise<void> {
  if (!isRoot) return;
  const [uid, gid] = (await runChild('sh', ['-c', 'id -u mysql; id -g mysql'])).trim().split('\n');
  await chown(folder, Number(uid), Number(gid));
}

function daemon(folder: string, socket: string, port: number): Child {
  const options = [
    `--datadir=${path.join(folder, 'data')}`,
    `--socket=${socket}`,
    `--tmpdir=${path.join(folder, 'tmp')}`,
    `--port=${port}`,
    '--bind-address=127.0.0.1',
    `--pid-file=${path.join(folder, 'pid')}`,
    '--character-set-server=utf8mb4',
    '--collation-server=utf8mb4_unicode_ci',
    '--innodb-buffer-pool-size=256M',
    // Throw-away data need not survive a power cut.
    '--innodb-flush-log-at-trx-commit=0',
    '--innodb-doublewrite=0',
    '--max-connections=200',
  ];
  return startChild('mariadbd', ['--no-defaults', ...asUser, ...options], { env });
}

async function connectAsRoot(child: Child, socket: string): Promise<Connection> {
  const deadline = Date.now() + 30_000;
  for (;;) {
    try {
      return await createConnection({ socketPath: socket, user: 'root' });
    } catch (cause) {
      // Not ready yet, unless it has ended or time is up.
      if (child.process.exitCode !== null || Date.now() > deadline)
        throw new Error(`MariaDB for tests did not start:\n${child.output()}`, { cause });
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}

async function createAccount(root: Connection): Promise<void> {
  for (const host of ['127.0.0.1', 'localhost']) {
    await root.query(`CREATE USER '${account.user}'@'${host}' IDENTIFIED BY '${account.password}'`);
    await root.query(`GRANT ALL ON *.* TO '${account.user}'@'${host}'`);
  }
}

/** Starts a MariaDB of its own on a free port, with nothing in it but the tests' account. */
export async function startDatabaseServer(): Promise<DatabaseServer> {
  const folder = await mkdtemp(path.join(tmpdir(), 'evenfall-db-'));
  await giveToMysql(folder);
  // MariaDB clears its folder for temporary tables when it starts, so no two servers may share one.
  const temporary = path.join(folder, 'tmp');
  await mkdir(temporary);
  await giveToMysql(temporary);
  const socket = path.join(folder, 'sock');
  const install = [
    '--no-defaults',
    ...asUser,
    `--datadir=${path.join(folder, 'data')}`,
    '--skip-test-db',
    `--tmpdir=${temporary}`,
  ];
  await runChild('mariadb-install-db', [...install, '--auth-root-authentication-method=normal'], { env });
  const port = await freePort();
  let child = daemon(folder, socket, port);
  const root = await connectAsRoot(child, socket);
  await createAccount(root);
  await root.end();

  const administrator = (): Promise<Connection> => connectAsRoot(child, socket);
  const address = (name: string): DatabaseAddress => ({
    host: '127.0.0.1',
    port,
    ...account,
    database: name,
    connections: 10,
  });
  return {
    port,
    administrator,
    address,
    createDatabase: async (name) => {
      const connection = await administrator();
      await connection.query(`CREATE OR REPLACE DATABASE \`${name}\``);
      await connection.end();
      return address(name);
    },
    halt: () => stopChild(child, 30_000),
    resume: async () => {
      child = daemon(folder, socket, port);
      await (await administrator()).end();
    },
    dispose: async () => {
      await stopChild(child, 30_000);
      await rm(folder, { recursive: true, force: true });
    },
  };
}
