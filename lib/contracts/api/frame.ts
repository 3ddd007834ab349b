import { z } from 'zod';
import { Band, FrameType } from '@/lib/contracts/bands';
import {
  Declination,
  line,
  listOf,
  Page,
  PathId,
  PublicId,
  Reason,
  RightAscension,
  Utc,
} from '@/lib/contracts/common';
import { NightParams, outsideNight } from './night';
import { operation } from './operation';

/** Most frames that one call takes. */
export const maxFramesPerCall = 5000;

/** Types that are exposures of the sky: their object's place gives the airmass. */
export const skyTypes: ReadonlySet<FrameType> = new Set<FrameType>(['standard', 'target', 'focus', 'test']);
const needsBand: ReadonlySet<FrameType> = new Set<FrameType>(['flat', 'standard', 'target']);
const needsObject: ReadonlySet<FrameType> = new Set<FrameType>(['standard', 'target']);

const number = z
  .number()
  .int('must be a whole number')
  .min(1, 'must be at least 1')
  .max(9_999_999, 'must be at most 9,999,999');
const exposure = z
  .number()
  .min(0, 'must be at least 0 s')
  .max(86_400, 'must be at most 86,400 s')
  .meta({ description: 'Exposure time, s', example: 60 });
const fwhm = z
  .number()
  .gt(0, 'must be above 0″')
  .max(120, 'must be at most 120″')
  .meta({ description: 'Full width at half maximum of star images, arcsec' });
const sky = z
  .number()
  .min(5, 'must be at least 5 mag per square arcsec')
  .max(30, 'must be at most 30 mag per square arcsec')
  .meta({ description: 'Sky brightness, mag per square arcsec' });
const object = line(80).meta({ description: 'What the telescope pointed at', example: 'Thistle 3' });
const file = line(255).min(1, 'must not be empty').meta({ example: 'n1103_0042.fits' });
const field = line(80).min(1, 'must not be empty').meta({ description: 'Standard field', example: 'SA 98' });
const programme = line(32)
  .min(1, 'must not be empty')
  .meta({ description: 'Programme’s code', example: 'MH26B-04' });

const fields = {
  number: number.optional().meta({ description: 'Unique within the night; the next free one if not given' }),
  type: FrameType,
  file: file.nullish().meta({ description: 'File name, unique within the night' }),
  object: object.default(''),
  field: field.nullish(),
  programme: programme.nullish(),
  ra: RightAscension.nullish(),
  dec: Declination.nullish(),
  band: Band.nullish(),
  utc_start: Utc.meta({ description: 'Start of the exposure, within the night’s noon to noon' }),
  exposure,
  fwhm: fwhm.nullish(),
  sky: sky.nullish(),
  comment: line(500).default(''),
};

interface Told {
  readonly type: FrameType;
  readonly object: string;
  readonly band?: Band | null | undefined;
  readonly ra?: number | null | undefined;
  readonly dec?: number | null | undefined;
  readonly exposure: number;
}

/** What must hold between a frame's own fields: [field, what is wrong]. The same for new and for corrected frames. */
export function frameFaults(frame: Told): readonly (readonly [keyof Told, string])[] {
  const found: [keyof Told, string][] = [];
  if (needsBand.has(frame.type) && !frame.band) found.push(['band', `is needed for a ${frame.type} frame`]);
  if (needsObject.has(frame.type) && frame.object === '') {
    found.push(['object', `is needed for a ${frame.type} frame`]);
  }
  if ((frame.ra ?? null) === null && (frame.dec ?? null) !== null) found.push(['ra', 'is needed with dec']);
  if ((frame.dec ?? null) === null && (frame.ra ?? null) !== null) found.push(['dec', 'is needed with ra']);
  if (frame.type !== 'bias' && frame.exposure === 0) found.push(['exposure', 'must be above 0 s']);
  return found;
}

/** What a frame must fit into. */
export interface FrameNight {
  readonly starts_at: string;
  readonly ends_at: string;
  readonly telescope: string;
  readonly bands: readonly Band[];
}

/** What is wrong with a frame in its night: [field, what is wrong]. */
export function frameFaultsInNight(
  frame: { readonly utc_start: string; readonly band?: Band | null | undefined },
  night: FrameNight,
): readonly (readonly ['utc_start' | 'band', string])[] {
  const found: ['utc_start' | 'band', string][] = [];
  const outside = outsideNight(frame.utc_start, night);
  if (outside !== null) found.push(['utc_start', outside]);
  if (frame.band && !night.bands.includes(frame.band)) {
    found.push([
      'band',
      `${night.telescope} has no filter for it: it has ${night.bands.join(', ') || 'none'}`,
    ]);
  }
  return found;
}

export const FrameInput = z
  .strictObject(fields)
  .superRefine((frame, context) => {
    for (const [path, message] of frameFaults(frame))
      context.addIssue({ code: 'custom', path: [path], message });
  })
  .meta({
    id: 'FrameInput',
    description:
      'An exposure as it is logged. Without ra and dec the server looks up the object or the field.',
    example: {
      type: 'target',
      object: 'Thistle 3',
      programme: 'MH26B-04',
      band: 'V',
      utc_start: '2026-11-03T23:41:05Z',
      exposure: 60,
    },
  });
export type FrameInput = z.infer<typeof FrameInput>;

export const FramesInput = z
  .array(FrameInput)
  .min(1, 'must hold at least one frame')
  .max(maxFramesPerCall, 'must hold at most 5,000 frames');

/** What deserves a second look; nothing of it is refused, because the log tells what happened. */
export const frameCautions = ['no-coordinates', 'below-horizon', 'below-pointing-limit', 'sun-up'] as const;
export const FrameCaution = z.enum(frameCautions);
export type FrameCaution = z.infer<typeof FrameCaution>;

export const frameOrigins = ['log', 'header', 'api', 'upload'] as const;
export type FrameOrigin = (typeof frameOrigins)[number];

export const Frame = z
  .object({
    id: PublicId,
    number: z.number().int(),
    type: FrameType,
    file: z.string().nullable(),
    object: z.string(),
    field: z.string().nullable().meta({ description: 'Standard field' }),
    programme: z.string().nullable().meta({ description: 'Programme’s code' }),
    ra: RightAscension.nullable(),
    dec: Declination.nullable(),
    band: Band.nullable(),
    utc_start: Utc,
    exposure: z.number().meta({ description: 'Exposure time, s' }),
    utc_mid: Utc.meta({ description: 'Mid-exposure' }),
    airmass: z
      .number()
      .nullable()
      .meta({ description: 'At mid-exposure; null without coordinates or below the horizon' }),
    altitude: z.number().nullable().meta({ description: 'True altitude at mid-exposure, deg' }),
    hour_angle: z.number().nullable().meta({ description: 'At mid-exposure, hours, west positive' }),
    moon_separation: z.number().nullable().meta({ description: 'deg' }),
    sun_altitude: z.number().meta({ description: 'deg' }),
    fwhm: z.number().nullable().meta({ description: 'arcsec' }),
    sky: z.number().nullable().meta({ description: 'mag per square arcsec' }),
    comment: z.string(),
    origin: z.enum(frameOrigins).meta({ description: 'How it came into the log' }),
    logged_by: z.string().meta({ description: 'Name of the person' }),
    cautions: z.array(FrameCaution).meta({ description: 'What deserves a second look' }),
    version: z.number().int(),
  })
  .meta({ id: 'Frame', description: 'One exposure with its geometry at mid-exposure' });
export type Frame = z.infer<typeof Frame>;

export const FrameQuery = Page.extend({
  type: FrameType.optional(),
  band: Band.optional(),
  object: z
    .string()
    .max(80)
    .optional()
    .meta({ description: 'Exact name, ignoring case, blanks and hyphens' }),
  from: Utc.optional().meta({ description: 'Mid-exposure at or after' }),
  to: Utc.optional().meta({ description: 'Mid-exposure before' }),
});
export type FrameQuery = z.infer<typeof FrameQuery>;

/** A correction names what changes and the version that its writer saw. */
export const FrameCorrection = z
  .strictObject({
    number: number.optional(),
    type: FrameType.optional(),
    file: file.nullable().optional(),
    object: object.optional(),
    field: field.nullable().optional(),
    programme: programme.nullable().optional(),
    ra: RightAscension.nullable().optional(),
    dec: Declination.nullable().optional(),
    band: Band.nullable().optional(),
    utc_start: Utc.optional(),
    exposure: exposure.optional(),
    fwhm: fwhm.nullable().optional(),
    sky: sky.nullable().optional(),
    comment: line(500).optional(),
    version: z.number().int().meta({ description: 'The version you have read' }),
    reason: Reason.optional(),
  })
  .refine((patch) => Object.keys(patch).some((key) => key !== 'version' && key !== 'reason'), {
    message: 'Nothing to change: send at least one field beside the version.',
  })
  .meta({
    id: 'FrameCorrection',
    example: { exposure: 90, version: 1, reason: 'exposure time mistyped' },
  });
export type FrameCorrection = z.infer<typeof FrameCorrection>;

export const NextFrame = z
  .object({
    number: z.number().int(),
    type: FrameType,
    object: z.string(),
    field: z.string().nullable(),
    programme: z.string().nullable(),
    ra: z.number().nullable(),
    dec: z.number().nullable(),
    band: Band.nullable().meta({ description: 'The one that follows in the sequence of bands so far' }),
    exposure: z
      .number()
      .nullable()
      .meta({ description: 'Of the last frame in that band, or the filter’s usual one' }),
  })
  .meta({ id: 'NextFrame', description: 'What the next frame probably is' });
export type NextFrame = z.infer<typeof NextFrame>;

export const FrameParams = NightParams.extend({ frame: PathId.meta({ description: 'Id of the frame' }) });

const tag = 'frames';
export const listFrames = operation({
  id: 'listFrames',
  method: 'get',
  path: '/nights/{id}/frames',
  tag,
  summary: 'Frames of a night, by number',
  description:
    'Investigators see the frames of their own programmes, and bias, dark, flat and standard frames that belong to no programme.',
  params: NightParams,
  query: FrameQuery,
  answer: listOf(Frame),
});
export const logFrames = operation({
  id: 'logFrames',
  method: 'post',
  path: '/nights/{id}/frames',
  tag,
  summary: 'Log one frame, or up to 5,000 at once',
  description:
    'All of them or none: every fault is reported, with the frame’s index in front of the field. One frame is answered by the frame, an array by a list.',
  params: NightParams,
  body: z.union([FrameInput, FramesInput]),
  answer: z.union([Frame, listOf(Frame)]),
  status: 201,
  faults: ['conflict'],
});
export const getFrame = operation({
  id: 'getFrame',
  method: 'get',
  path: '/nights/{id}/frames/{frame}',
  tag,
  summary: 'One frame',
  params: FrameParams,
  answer: Frame,
});
export const correctFrame = operation({
  id: 'correctFrame',
  method: 'patch',
  path: '/nights/{id}/frames/{frame}',
  tag,
  summary: 'Correct a frame',
  description: 'The earlier values stay in the audit trail; geometry is derived anew.',
  params: FrameParams,
  body: FrameCorrection,
  answer: Frame,
  faults: ['conflict', 'stale'],
});
export const removeFrame = operation({
  id: 'removeFrame',
  method: 'delete',
  path: '/nights/{id}/frames/{frame}',
  tag,
  summary: 'Withdraw a frame that was logged by mistake',
  description: 'Possible while no measurement refers to it. The whole row stays in the audit trail.',
  params: FrameParams,
  query: z.object({ reason: Reason }),
  faults: ['conflict'],
});
export const getNextFrame = operation({
  id: 'getNextFrame',
  method: 'get',
  path: '/nights/{id}/next-frame',
  tag,
  summary: 'What the next frame probably is',
  params: NightParams,
  answer: NextFrame,
});
