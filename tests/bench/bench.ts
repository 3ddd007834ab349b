import type { DatabaseServer } from '@/tests/support/database-server';

/** One line of the table that `npm run bench` prints. */
export interface Figure {
  readonly name: string;
  readonly measured: number;
  /** What the same machine takes for the comparable plain thing, in the same run; null where the figure stands alone. */
  readonly baseline: number | null;
  readonly unit: 's' | 'ms' | 'MiB';
  /** Largest ratio to the baseline, or largest figure where there is no baseline; null where it is only told. */
  readonly aim: number | null;
}

export interface BenchWorld {
  /** A private MariaDB with every migration applied and the reference data loaded; its address is in the environment. */
  readonly server: DatabaseServer;
  /** DATA_DIR of this run: removed at its end. */
  readonly folder: string;
}

/** A subject of measurement: a file of its own, listed in main.ts. */
export interface Bench {
  readonly name: string;
  readonly run: (world: BenchWorld) => Promise<readonly Figure[]>;
}
