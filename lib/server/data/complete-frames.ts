import 'server-only';
import { skyTypes } from '@/lib/contracts/api/frame';
import type { FrameType } from '@/lib/contracts/bands';
import { starKey } from '@/lib/contracts/star-name';
import type { Issue } from '@/lib/faults/fault';
import {
  programmesByCode,
  standardFields,
  standardStarsByKey,
  targetsByKey,
  type FieldRow,
  type ProgrammeRow,
  type StarRow,
  type TargetRow,
} from './object-places';

/** What a frame says of where it looked. */
export interface Told {
  readonly type: FrameType;
  readonly object: string;
  readonly field?: string | null | undefined;
  /** Code; null for none, undefined for whose target the object is. */
  readonly programme?: string | null | undefined;
  readonly ra?: number | null | undefined;
  readonly dec?: number | null | undefined;
}

/** The same, completed from the programmes' targets and the standard stars. */
export interface Place {
  readonly object: string;
  readonly field: string | null;
  readonly programmeId: number | null;
  readonly ra: number | null;
  readonly decl: number | null;
}
export interface Completed {
  readonly place: Place;
  readonly issues: readonly Issue[];
}

interface Known {
  readonly programmes: ReadonlyMap<string, ProgrammeRow>;
  readonly targets: readonly TargetRow[];
  readonly fields: ReadonlyMap<string, FieldRow>;
  readonly stars: ReadonlyMap<string, StarRow>;
}

/** Names are short of the columns that hold them: a key cannot be longer than its name. */
const distinct = (texts: readonly (string | null | undefined)[]): readonly string[] => [
  ...new Set(texts.filter((text): text is string => text !== null && text !== undefined && text !== '')),
];

async function know(frames: readonly Told[]): Promise<Known> {
  const sky = frames.filter(({ type }) => skyTypes.has(type));
  const keys = distinct(sky.map(({ object }) => starKey(object)));
  const [programmes, targets, fields, stars] = await Promise.all([
    programmesByCode(distinct(frames.map(({ programme }) => programme))),
    targetsByKey(keys),
    sky.length === 0 ? [] : standardFields(),
    standardStarsByKey(keys),
  ]);
  return {
    programmes,
    targets,
    fields: new Map(fields.map((row) => [starKey(row.field), row])),
    stars: new Map(stars.map((row) => [row.nameKey, row])),
  };
}

/** Completes frames: whose programme, which field, where on the sky. Four queries, however many frames. */
export async function completeFrames(frames: readonly Told[]): Promise<readonly Completed[]> {
  const known = await know(frames);
  return frames.map((frame) => complete(frame, known));
}

function complete(frame: Told, known: Known): Completed {
  const programme = frame.programme ? known.programmes.get(frame.programme.toLowerCase()) : undefined;
  const issues = programmeIssues(frame, programme);
  const given: Place = {
    object: frame.object,
    field: frame.field ?? null,
    programmeId: programme?.id ?? null,
    ra: frame.ra ?? null,
    decl: frame.dec ?? null,
  };
  if (issues.length > 0 || !skyTypes.has(frame.type)) return { place: given, issues };
  return frame.type === 'standard' ? asStandard(frame, given, known) : asTarget(frame, given, known);
}

function programmeIssues(frame: Told, programme: ProgrammeRow | undefined): readonly Issue[] {
  if (!frame.programme) return [];
  const issue = (message: string): readonly Issue[] => [
    { path: 'programme', value: frame.programme ?? '', message },
  ];
  if (!programme) return issue('is not the code of a programme');
  return programme.archivedAt === null ? [] : issue('is the code of an archived programme');
}

/** A standard frame shows a field, or a star of one; failing both, a target that has standards of its own. */
function asStandard(frame: Told, given: Place, known: Known): Completed {
  const key = starKey(frame.object);
  const star = known.stars.get(key);
  const field = known.fields.get(starKey(given.field ?? star?.field ?? frame.object));
  const place = at(given, star ?? field);
  if (star || field) return { place: { ...place, field: field?.field ?? given.field }, issues: [] };
  return asTarget(frame, given, known);
}

/** Anything else shows a target; whose, follows from the name where one programme alone has it. */
function asTarget(frame: Told, given: Place, known: Known): Completed {
  const key = starKey(frame.object);
  const namesakes = known.targets.filter(({ nameKey, isArchived }) => nameKey === key && !isArchived);
  const own =
    given.programmeId === null ? namesakes : namesakes.filter((t) => t.programmeId === given.programmeId);
  const [target] = own;
  if (!target) return { place: at(given, known.stars.get(key) ?? known.fields.get(key)), issues: [] };
  const place = { ...at(given, target), object: target.name };
  if (own.length === 1) {
    const infers = frame.type === 'target' && frame.programme === undefined;
    return { place: infers ? { ...place, programmeId: target.programmeId } : place, issues: [] };
  }
  if (given.ra !== null || frame.type !== 'target') return { place, issues: [] };
  const codes = own.map(({ programme }) => programme).join(' and ');
  const message = `is needed: “${target.name}” is a target of ${codes}`;
  return { place, issues: [{ path: 'programme', message, remedy: 'Say whose frame it is.' }] };
}

/** Coordinates that were given stand; others are looked up. */
const at = (given: Place, found: { readonly ra: number; readonly decl: number } | undefined): Place =>
  given.ra === null && found ? { ...given, ra: found.ra, decl: found.decl } : given;
