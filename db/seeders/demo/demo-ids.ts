import type { PersonIds } from './load-people';

/** Internal ids of what the nights refer to. */
export interface DemoIds {
  readonly telescope: number;
  readonly people: PersonIds;
  /** By programme code. */
  readonly programmes: ReadonlyMap<string, number>;
}
