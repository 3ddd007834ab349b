import type { Sequelize } from 'sequelize';
import { ApiToken } from './api-token';
import { AuditEvent } from './audit-event';
import { Camera } from './camera';
import { ColumnMapping } from './column-mapping';
import { Condition } from './condition';
import { EquipmentEpoch } from './equipment-epoch';
import { Filter } from './filter';
import { Frame } from './frame';
import { IdempotencyKey } from './idempotency-key';
import { Job } from './job';
import { Mail } from './mail';
import { MeasurementFault } from './measurement-fault';
import { MeasurementFlag } from './measurement-flag';
import { MeasurementSet } from './measurement-set';
import { MeasurementSetFrame } from './measurement-set-frame';
import { MeasurementStar } from './measurement-star';
import { Night } from './night';
import { NightObserver } from './night-observer';
import { Observatory } from './observatory';
import { OneTimeLink } from './one-time-link';
import { Person } from './person';
import { PersonRole } from './person-role';
import { Programme } from './programme';
import { ProgrammeMember } from './programme-member';
import { ProgrammeTarget } from './programme-target';
import { Remark } from './remark';
import { SeenResult } from './seen-result';
import { Session } from './session';
import { SignInFailure } from './sign-in-failure';
import { Site } from './site';
import { Solution } from './solution';
import { SolutionBand } from './solution-band';
import { SolutionCoefficient } from './solution-coefficient';
import { SolutionComment } from './solution-comment';
import { SolutionExclusion } from './solution-exclusion';
import { SolutionNight } from './solution-night';
import { SolutionObservation } from './solution-observation';
import { SolutionSet } from './solution-set';
import { StandardSource } from './standard-source';
import { StandardStar } from './standard-star';
import { Telescope } from './telescope';
import { TimeLoss } from './time-loss';
import { Transformation } from './transformation';

/**
 * One model a table. Two tables have none: `measurements` and `calibrated_magnitudes` hold millions of numeric rows
 * that are loaded and read in bulk by plain SQL (lib/server/data), where an object per row would cost memory and serve nobody.
 */
export const models = [
  Observatory,
  Site,
  Telescope,
  Camera,
  Filter,
  EquipmentEpoch,
  Person,
  PersonRole,
  Programme,
  ProgrammeMember,
  ProgrammeTarget,
  Session,
  ApiToken,
  OneTimeLink,
  SignInFailure,
  Night,
  NightObserver,
  Frame,
  Condition,
  Remark,
  TimeLoss,
  StandardSource,
  StandardStar,
  MeasurementSet,
  MeasurementSetFrame,
  MeasurementFault,
  MeasurementStar,
  MeasurementFlag,
  ColumnMapping,
  Job,
  Mail,
  AuditEvent,
  IdempotencyKey,
  Solution,
  SolutionNight,
  SolutionBand,
  SolutionCoefficient,
  SolutionObservation,
  SolutionSet,
  SolutionExclusion,
  SolutionComment,
  Transformation,
  SeenResult,
] as const;

/** Binds every model to the connection and associates them. Call once for each connection. */
export function defineModels(sequelize: Sequelize): void {
  for (const model of models) model.define(sequelize);
  for (const model of models) if ('associate' in model) model.associate();
}
