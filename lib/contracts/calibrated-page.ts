import { z } from 'zod';
import { calibratedFlags, type CalibratedFlag } from '@/lib/photometry/calibrated-flags';
import type { Verdict } from '@/lib/photometry/night-evidence';
import type { CalibratedStar } from './api/calibrated';
import type { Job } from './api/job';
import { PathId } from './common';

/** Columns that the list of calibrated magnitudes can be sorted by. */
export const calibratedSorts = [
  'star',
  'ra',
  'V',
  'V_total',
  'BV',
  'BV_total',
  'B',
  'UB',
  'VR',
  'VI',
  'n_V',
  'airmass',
] as const;
export type CalibratedSort = (typeof calibratedSorts)[number];

/** Stars on one page of the list. */
export const calibratedPerPage = 100;
/** Most stars that the diagram draws; of more, an even choice. */
export const mostDiagramStars = 5000;

/** A caution that all stars of a night share says nothing of any of them: the page says it once, for the night. */
export const cautionOfNight: CalibratedFlag = 'night_with_care';
export const bitOfNight = 1 << calibratedFlags[cautionOfNight].bit;

/** A limit of a range as people type it: also with a comma or a true minus sign. */
const Limit = z
  .string()
  .trim()
  .transform((text) => text.replace('−', '-').replace(',', '.'))
  .pipe(z.string().regex(/^[-+]?\d{1,3}(\.\d{0,6})?$/))
  .transform(Number);

const parts = {
  programme: z.string().max(40),
  solution: z.string().min(1).max(40),
  star: z.string().trim().min(1).max(80),
  v_from: Limit,
  v_to: Limit,
  bv_from: Limit,
  bv_to: Limit,
  clean: z.literal('1').transform(() => true),
  sort: z.enum(calibratedSorts),
  descending: z.literal('1').transform(() => true),
  page: z
    .string()
    .regex(/^[1-9]\d{0,5}$/)
    .transform(Number),
  at: z
    .string()
    .regex(/^\d{1,9}$/)
    .transform(Number),
} as const;

/** What a list of calibrated magnitudes is narrowed to and sorted by, as its address says it. */
export interface CalibratedPageQuery {
  /** Code, empty for targets of no programme; the first that the caller may see when absent. */
  readonly programme?: string;
  /** Public id of an earlier solution; the approved one when absent. */
  readonly solution?: string;
  /** Part of the star's name. */
  readonly star?: string;
  readonly v_from?: number;
  readonly v_to?: number;
  readonly bv_from?: number;
  readonly bv_to?: number;
  /** Only stars without a caution of their own. */
  readonly clean?: boolean;
  readonly sort?: CalibratedSort;
  readonly descending?: boolean;
  /** From 1. */
  readonly page?: number;
  /** Number of a star: the page that it stands on is shown, whatever `page` says. */
  readonly at?: number;
}

/** What a list is sorted by, and which way: by V, the brightest first, unless its address says otherwise. */
export const calibratedOrder = ({
  sort = 'V',
  descending = false,
}: CalibratedPageQuery): Required<Pick<CalibratedPageQuery, 'sort' | 'descending'>> => ({ sort, descending });

/** Reads the address of the page; what cannot be read is left out. */
export function calibratedPageQuery(
  values: Readonly<Record<string, string | readonly string[] | undefined>>,
): CalibratedPageQuery {
  const read = Object.entries(parts).flatMap(([name, schema]) => {
    const parsed = schema.safeParse(values[name]);
    return parsed.success ? [[name, parsed.data]] : [];
  });
  return Object.fromEntries(read) as CalibratedPageQuery;
}

/** A star of the list, with its number within this result. */
export interface NumberedStar extends CalibratedStar {
  readonly no: number;
}

export interface DiagramStar {
  readonly no: number;
  readonly star: string;
  readonly V: number;
  readonly BV: number;
  readonly hasCautions: boolean;
}

/** Where the shown magnitudes come from. */
export interface CalibratedOrigin {
  readonly observatory: string;
  readonly telescope: string;
  readonly solution: string;
  readonly number: number;
  readonly state: 'approved' | 'superseded';
  readonly verdict: Verdict | null;
  readonly approvedBy: string | null;
  readonly approvedAt: string | null;
  readonly standardsSource: string;
  readonly softwareVersion: string;
  readonly calculatedAt: string | null;
}

/** Which quantities any star of the result has. */
export interface MeasuredQuantities {
  readonly B: boolean;
  readonly UB: boolean;
  readonly VR: boolean;
  readonly VI: boolean;
}

export interface CalibratedResult {
  readonly origin: CalibratedOrigin;
  readonly has: MeasuredQuantities;
  /** Stars of the result, and of those the ones that the query lets through. */
  readonly nStars: number;
  readonly nShown: number;
  readonly nClean: number;
  /** How many stars carry each caution, the most frequent first; those that none carries are absent. */
  readonly cautions: readonly { readonly flag: CalibratedFlag; readonly nStars: number }[];
  readonly stars: readonly NumberedStar[];
  /** From 1; the last one where the query asked for more. */
  readonly page: number;
  readonly nPages: number;
  /** Stars that the query lets through and that have V and B−V: at most `mostDiagramStars`. */
  readonly diagram: readonly DiagramStar[];
  /** How many there are. */
  readonly nDiagram: number;
}

/**
 * Why there is nothing to show: the night's magnitudes are not the caller's to see; nobody has approved a solution; the
 * targets are being transformed; there was no target of a programme that the caller may see.
 */
export type NoResult =
  | { readonly why: 'hidden' | 'no-solution' | 'no-targets' }
  | { readonly why: 'not-photometric'; readonly solution: string }
  | {
      readonly why: 'running';
      readonly job: Pick<Job, 'id' | 'state' | 'progress' | 'message'> | null;
      readonly solution: string;
      /** Whether the caller may queue a new job when this one has come to nothing. */
      readonly mayStart: boolean;
    };

/** All that a night's page of results shows. */
export interface CalibratedPage {
  readonly night: string;
  /** Programmes with magnitudes of the night, of those the caller may see; an empty code stands for none. */
  readonly programmes: readonly { readonly code: string; readonly title: string }[];
  /** The one that is shown. */
  readonly programme: string | null;
  /** Solutions with magnitudes of that programme, the newest first. */
  readonly solutions: readonly {
    readonly id: string;
    readonly number: number;
    readonly state: 'approved' | 'superseded';
  }[];
  readonly result: CalibratedResult | NoResult;
}

/** Results that a person has opened. */
export const SeenResults = z.object({ night: PathId, programme: z.string().max(40) });
export type SeenResults = z.output<typeof SeenResults>;

/** Asks for magnitudes whose job came to nothing. */
export const TransformAgain = z.strictObject({ solution: PathId });
