import { z } from 'zod';

/** Roles that hold for the whole observatory. */
export const observatoryRoles = ['manager', 'photometrist', 'observer'] as const;
/** Roles that hold within one programme. */
export const programmeRoles = ['pi', 'coinvestigator'] as const;

export const ObservatoryRole = z.enum(observatoryRoles);
export type ObservatoryRole = z.infer<typeof ObservatoryRole>;
export const ProgrammeRole = z.enum(programmeRoles);
export type ProgrammeRole = z.infer<typeof ProgrammeRole>;

export const roleNames: Readonly<Record<ObservatoryRole | ProgrammeRole, string>> = {
  manager: 'manager',
  photometrist: 'photometrist',
  observer: 'observer',
  pi: 'principal investigator',
  coinvestigator: 'co-investigator',
};
