import { Sequelize } from 'sequelize';
import { defineModels } from './models/define-models';

export interface DatabaseAddress {
  readonly host: string;
  readonly port: number;
  readonly user: string;
  readonly password: string;
  readonly database: string;
  /** Largest number of connections this process holds. */
  readonly connections: number;
}

const holder = globalThis as typeof globalThis & { evenfallDatabase?: Sequelize };

/** The address in the environment; a missing variable is named. */
export function addressFromEnvironment(env: NodeJS.ProcessEnv = process.env): DatabaseAddress {
  const need = (name: string): string => {
    const value = env[name];
    if (value === undefined || value === '') throw new Error(`The environment variable ${name} is not set.`);
    return value;
  };
  return {
    host: env['DB_HOST'] ?? '127.0.0.1',
    port: Number(env['DB_PORT'] ?? '3307'),
    user: env['DB_USER'] ?? 'evenfall',
    password: need('DB_PASSWORD'),
    database: env['DB_NAME'] ?? 'evenfall',
    connections: Number(env['DB_CONNECTIONS'] ?? '12'),
  };
}

/** A pool with every model bound to it. Times are UTC in both directions. */
export function connect(address: DatabaseAddress): Sequelize {
  const sequelize = new Sequelize({
    dialect: 'mariadb',
    host: address.host,
    port: address.port,
    username: address.user,
    password: address.password,
    database: address.database,
    timezone: '+00:00',
    logging: false,
    pool: { max: address.connections, min: 0, acquire: 15_000, idle: 10_000 },
    define: { underscored: true, timestamps: false, freezeTableName: true },
    dialectOptions: {
      connectTimeout: 5_000,
      // Bulk loading reads files that this process wrote itself; see lib/server/data/load-rows.ts.
      permitLocalInfile: true,
    },
  });
  defineModels(sequelize);
  return sequelize;
}

/** This process's pool, made at first use. Kept on globalThis: a development server reloads modules but not the process. */
export function database(): Sequelize {
  holder.evenfallDatabase ??= connect(addressFromEnvironment());
  return holder.evenfallDatabase;
}

export async function closeDatabase(): Promise<void> {
  const open = holder.evenfallDatabase;
  delete holder.evenfallDatabase;
  await open?.close();
}
