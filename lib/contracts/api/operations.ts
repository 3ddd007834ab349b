import * as health from './health';
import * as job from './job';
import * as openapi from './openapi';
import type { Operation } from './operation';

/** Every file that declares operations. A new one is listed here, and a test finds the one that is not. */
const files = [health, job, openapi] as const;

const isOperation = (value: unknown): value is Operation =>
  typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'id' in value;

/** Every call of the HTTP interface. */
export const operations: readonly Operation[] = files.flatMap((file) =>
  Object.values(file).filter(isOperation),
);
