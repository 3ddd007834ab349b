import { z } from 'zod';
import { Band } from '@/lib/contracts/bands';
import { CalendarDate, line, listOf, Page, PathId, PublicId, Reason, Utc } from '@/lib/contracts/common';
import { ColumnMapping } from '@/lib/contracts/measurement-columns';
import { MeasurementKind, MeasurementSetState, tolerances } from '@/lib/contracts/measurement-kinds';
import { JobState } from './job';
import { NightParams } from './night';
import { operation } from './operation';

const Checking = z
  .object({
    id: PublicId,
    state: JobState,
    progress: z.number().min(0).max(1),
    message: z.string().meta({ description: 'What is being done' }),
  })
  .meta({ id: 'MeasurementSetJob', description: 'The newest job that checks the set' });

export const MeasurementSet = z
  .object({
    id: PublicId,
    night: PublicId,
    night_date: CalendarDate,
    telescope: z.string(),
    kind: MeasurementKind,
    name: z.string(),
    state: MeasurementSetState,
    file_name: z.string().nullable().meta({ description: 'Null where you may not see the whole set' }),
    size: z.number().int().meta({ description: 'Size of the original, bytes' }),
    sha256: z.string().meta({ description: 'Of the original’s bytes' }),
    tolerance: z.number().meta({ description: 'For matching by position, arcsec' }),
    mapping: ColumnMapping,
    comments: z.string().meta({ description: 'The lines before the header that began with #' }),
    rows: z
      .number()
      .int()
      .nullable()
      .meta({ description: 'Rows that you may see; null until the table has been read' }),
    matched_rows: z.number().int().nullable().meta({
      description:
        'Rows matched to a standard star; null until then, and where you may not see the whole set',
    }),
    frames_created: z.number().int().meta({ description: 'Frames that the set brought into the log' }),
    faults: z.number().int().meta({ description: 'All of them; the first 1,000 are kept word for word' }),
    uploaded_by: z.string().meta({ description: 'Name of the person' }),
    uploaded_at: Utc,
    checked_at: Utc.nullable(),
    job: Checking.nullable(),
    is_whole: z.boolean().meta({
      description: 'Whether you may see all of it: the original, its comments and the rows of every frame',
    }),
    may_check: z.boolean().meta({ description: 'Whether its check ended early and you may start it again' }),
    may_refuse: z.boolean().meta({ description: 'Whether you may take it back' }),
  })
  .meta({ id: 'MeasurementSet', description: 'One uploaded table of instrumental magnitudes, kept whole' });
export type MeasurementSet = z.infer<typeof MeasurementSet>;

export const MeasurementFault = z
  .object({
    line: z.number().int().nullable().meta({ description: 'Line of the file, from 1' }),
    column: z.string().nullable().meta({ description: 'In the file’s own spelling' }),
    value: z.string().nullable(),
    message: z.string().meta({ description: 'What is wrong' }),
    remedy: z.string().meta({ description: 'What to do about it' }),
  })
  .meta({ id: 'MeasurementFault' });
export type MeasurementFault = z.infer<typeof MeasurementFault>;

export const MeasuredStar = z
  .object({
    number: z.number().int().meta({ description: 'Of the star within the set' }),
    name: z.string().meta({ description: 'As written; empty where the table gives its position only' }),
    ra: z.number().nullable().meta({ description: 'Of its first row, deg J2000' }),
    dec: z.number().nullable(),
    rows: z.number().int(),
    first_line: z.number().int().meta({ description: 'Line of the file where it stands first' }),
    standard: z
      .object({ name: z.string(), field: z.string(), V: z.number(), BV: z.number() })
      .nullable()
      .meta({ description: 'The standard star that it is, with its published magnitude and colour' }),
    matched_by: z.enum(['name', 'position']).nullable(),
    separation: z.number().nullable().meta({ description: 'From the published position, arcsec' }),
    reason: z.string().meta({ description: 'Why it is no standard, or a caution' }),
  })
  .meta({ id: 'MeasuredStar', description: 'A distinct star of a set and what it was matched to' });
export type MeasuredStar = z.infer<typeof MeasuredStar>;

export const MeasurementRow = z
  .object({
    row: z.number().int().meta({ description: 'Data row of the file, from 1' }),
    frame: z.number().int().meta({ description: 'Number of the frame' }),
    band: Band.nullable(),
    star: z.string(),
    standard: z.string().nullable().meta({ description: 'Name of the standard star that it is' }),
    inst_mag: z.number(),
    inst_err: z.number(),
    ra: z.number().nullable(),
    dec: z.number().nullable(),
    x: z.number().nullable(),
    y: z.number().nullable(),
    fwhm: z.number().nullable().meta({ description: 'pixels' }),
    sky: z.number().nullable().meta({ description: 'counts' }),
    peak: z.number().nullable().meta({ description: 'counts' }),
    flag: z.string().nullable(),
  })
  .meta({ id: 'MeasurementRow' });
export type MeasurementRow = z.infer<typeof MeasurementRow>;

export const SavedMapping = z
  .object({
    headers: z.array(z.string()),
    mapping: ColumnMapping,
    saved_by: z.string().meta({ description: 'Name of the person' }),
    saved_at: Utc,
  })
  .meta({ id: 'SavedMapping', description: 'How the tables of a telescope with these headers are read' });
export type SavedMapping = z.infer<typeof SavedMapping>;

export const SaveMapping = z.strictObject({
  headers: z.array(z.string().max(200)).min(1).max(500).meta({ description: 'Of the file, in order' }),
  mapping: ColumnMapping,
});
export type SaveMapping = z.infer<typeof SaveMapping>;

const MappingText = z
  .string()
  .max(8000)
  .transform((text, context): unknown => {
    try {
      return JSON.parse(text) as unknown;
    } catch {
      // The reader of the answer sees what was sent; the parser's own words add nothing.
      context.addIssue({ code: 'custom', message: 'must be JSON, such as {"inst_mag": "Magnitude"}' });
      return z.NEVER;
    }
  })
  .pipe(ColumnMapping)
  .meta({ description: 'JSON: column → header in the file, where the file does not use our names' });

export const UploadQuery = z.object({
  kind: MeasurementKind.default('mixed').meta({
    description:
      'What its rows are: only stars of `standard` and `mixed` sets are looked for among the standards',
  }),
  name: line(120)
    .min(1, 'must not be empty')
    .optional()
    .meta({ description: 'The file’s name, if you give none' }),
  tolerance: z.coerce
    .number()
    .min(tolerances.smallest, `must be at least ${tolerances.smallest}″`)
    .max(tolerances.largest, `must be at most ${tolerances.largest}″`)
    .default(tolerances.usual)
    .meta({ description: 'For matching by position, arcsec' }),
  file: line(255)
    .min(1, 'must not be empty')
    .optional()
    .meta({ description: 'File name, for a body that brings none' }),
  mapping: MappingText.optional(),
});
export type UploadQuery = z.infer<typeof UploadQuery>;

export const Queued = z.object({ set: PublicId, job: PublicId });
export type Queued = z.infer<typeof Queued>;

const SetParams = z.object({ id: PathId.meta({ description: 'Id of the measurement set' }) });
const tag = 'measurements';

export const uploadMeasurements = operation({
  id: 'uploadMeasurements',
  method: 'post',
  path: '/nights/{id}/measurements',
  tag,
  summary: 'Upload a measurement table',
  description:
    'The body is the table itself (text/csv), or multipart/form-data with one part `file`. It is taken whole or not at all, by a job; the set then says how it went. The same bytes a second time in one night are a conflict, and the answer names the set that has them.',
  params: NightParams,
  query: UploadQuery,
  raw: ['text/csv', 'multipart/form-data'],
  answer: Queued,
  status: 202,
  faults: ['conflict', 'unsupported'],
});
export const listMeasurementSets = operation({
  id: 'listMeasurementSets',
  method: 'get',
  path: '/nights/{id}/measurements',
  tag,
  summary: 'Measurement sets of a night, the newest first',
  params: NightParams,
  query: Page,
  answer: listOf(MeasurementSet),
});
export const getMeasurementSet = operation({
  id: 'getMeasurementSet',
  method: 'get',
  path: '/measurement-sets/{id}',
  tag,
  summary: 'One measurement set',
  params: SetParams,
  answer: MeasurementSet,
});
export const FaultsQuery = Page.extend({ format: z.enum(['json', 'csv']).default('json') });
export const listMeasurementFaults = operation({
  id: 'listMeasurementFaults',
  method: 'get',
  path: '/measurement-sets/{id}/faults',
  tag,
  summary: 'What was wrong with a refused table',
  description: 'As JSON in pages ({items, next}), or all of them as a table with format=csv.',
  params: SetParams,
  query: FaultsQuery,
  stream: ['application/json', 'text/csv'],
});
export const getMeasurementOriginal = operation({
  id: 'getMeasurementOriginal',
  method: 'get',
  path: '/measurement-sets/{id}/original',
  tag,
  summary: 'The original file, byte for byte',
  params: SetParams,
  stream: ['application/octet-stream'],
});
export const StarsQuery = Page.extend({
  matched: z
    .enum(['yes', 'no'])
    .optional()
    .meta({ description: 'Only those that are standards, or only the others' }),
  reason: z.string().max(300).optional().meta({ description: 'Only those with exactly this reason' }),
});
export type StarsQuery = z.infer<typeof StarsQuery>;
export const listMeasuredStars = operation({
  id: 'listMeasuredStars',
  method: 'get',
  path: '/measurement-sets/{id}/stars',
  tag,
  summary: 'The distinct stars of a set and what each was matched to',
  params: SetParams,
  query: StarsQuery,
  answer: listOf(MeasuredStar),
});
export const listMeasurementRows = operation({
  id: 'listMeasurementRows',
  method: 'get',
  path: '/measurement-sets/{id}/rows',
  tag,
  summary: 'Rows of a set, as the file has them in order',
  params: SetParams,
  query: Page,
  answer: listOf(MeasurementRow),
});
export const checkMeasurementSet = operation({
  id: 'checkMeasurementSet',
  method: 'post',
  path: '/measurement-sets/{id}/check',
  tag,
  summary: 'Check a set again whose check was cancelled or failed',
  params: SetParams,
  answer: Queued,
  status: 202,
  faults: ['conflict'],
});
export const RefuseSet = z.strictObject({ reason: Reason });
export const refuseMeasurementSet = operation({
  id: 'refuseMeasurementSet',
  method: 'post',
  path: '/measurement-sets/{id}/refuse',
  tag,
  summary: 'Take a set back that no solution uses',
  description: 'Its rows are removed; the original, and the frames that it brought into the log, stay.',
  params: SetParams,
  body: RefuseSet,
  answer: MeasurementSet,
  faults: ['conflict'],
});
export const listColumnMappings = operation({
  id: 'listColumnMappings',
  method: 'get',
  path: '/nights/{id}/column-mappings',
  tag,
  summary: 'How tables of the night’s telescope are read that do not use our column names',
  params: NightParams,
  answer: listOf(SavedMapping),
});
export const saveColumnMapping = operation({
  id: 'saveColumnMapping',
  method: 'put',
  path: '/nights/{id}/column-mappings',
  tag,
  summary: 'Remember how tables with these headers are read',
  params: NightParams,
  body: SaveMapping,
  answer: SavedMapping,
});
