import { z } from 'zod';
import { parseDeclination, parseRightAscension, type ParsedAngle } from '@/lib/astro/parse-sexagesimal';
import { TargetKind } from './api/programme';
import { line, PublicId } from './common';
import { figure, paragraphs } from './form-fields';
import { ProgrammeRole } from './roles';

export const ProgrammeCode = z.string().min(1).max(32);
const Title = line(200).min(1, 'is missing');
const Months = figure({ min: 0, max: 120, unit: 'months', whole: true });

export const CreateProgramme = z.object({
  code: line(32).regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, 'must be letters, digits, points and hyphens'),
  title: Title,
  summary: paragraphs(5000),
  proprietaryMonths: Months,
});

export const ChangeProgramme = z.object({
  programme: ProgrammeCode,
  title: Title,
  summary: paragraphs(5000),
  proprietaryMonths: Months,
});

export const ProgrammeAlone = z.object({ programme: ProgrammeCode });
export const SetMember = z.object({ programme: ProgrammeCode, person: PublicId, role: ProgrammeRole });
export const RemoveMember = z.object({ programme: ProgrammeCode, person: PublicId });

const angle = (parse: (text: string) => ParsedAngle) =>
  z
    .string()
    .trim()
    .min(1, 'is missing')
    .transform((text, context) => {
      const parsed = parse(text);
      if (parsed.ok) return parsed.degrees;
      context.addIssue({ code: 'custom', message: parsed.reason });
      return z.NEVER;
    });

export const SaveTarget = z.object({
  programme: ProgrammeCode,
  /** The target's present name; empty for a new one. */
  target: z.string().max(80),
  name: line(80).min(1, 'is missing'),
  kind: TargetKind,
  ra: angle(parseRightAscension),
  dec: angle(parseDeclination),
  note: line(500).default(''),
});

export const RemoveTarget = z.object({ programme: ProgrammeCode, target: z.string().min(1).max(80) });

export const ArchiveProgramme = z.object({
  programme: ProgrammeCode,
  isArchived: z.enum(['yes', 'no']).transform((value) => value === 'yes'),
});
