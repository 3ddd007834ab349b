import * as calibrated from './calibrated';
import * as condition from './condition';
import * as frame from './frame';
import * as health from './health';
import * as job from './job';
import * as me from './me';
import * as measurementSet from './measurement-set';
import * as night from './night';
import * as objectName from './object-name';
import * as openapi from './openapi';
import type { Operation } from './operation';
import * as programme from './programme';
import * as remark from './remark';
import * as solution from './solution';
import * as standard from './standard';
import * as telescope from './telescope';
import * as timeLoss from './time-loss';
import * as token from './token';

/** Every file that declares operations. A new one is listed here, and a test finds the one that is not. */
const files = [
  token,
  me,
  telescope,
  programme,
  night,
  frame,
  condition,
  remark,
  timeLoss,
  objectName,
  standard,
  job,
  health,
  openapi,
  measurementSet,
  solution,
  calibrated,
] as const;

const isOperation = (value: unknown): value is Operation =>
  typeof value === 'object' && value !== null && 'method' in value && 'path' in value && 'id' in value;

/** Every call of the HTTP interface. */
export const operations: readonly Operation[] = files.flatMap((file) =>
  Object.values(file).filter(isOperation),
);
