import { z } from 'zod';
import { Band } from '@/lib/contracts/bands';
import { CalendarDate, line, listOf, Page, PathId, PublicId, Reason, Utc } from '@/lib/contracts/common';
import { AirmassFormula, Coefficient, ObservationId, SolveOptions } from '@/lib/contracts/solve-options';
import { verdicts } from '@/lib/photometry/night-evidence';
import { JobState } from './job';
import { NightParams } from './night';
import { operation } from './operation';

export const solutionStates = ['draft', 'proposed', 'approved', 'superseded', 'withdrawn'] as const;
export const SolutionState = z.enum(solutionStates);
export type SolutionState = z.infer<typeof SolutionState>;

export const Verdict = z.enum(verdicts);
export type Verdict = z.infer<typeof Verdict>;

const figure = z.number().nullable();
const Range = z.object({ min: z.number(), max: z.number() }).nullable();
const Who = z.object({ name: z.string(), at: Utc }).nullable();

export const SolutionCoefficient = z
  .object({
    name: Coefficient,
    status: z.enum(['free', 'fixed', 'prior']),
    value: figure.meta({ description: 'Null where the observations cannot determine it' }),
    error: figure.meta({ description: 'Standard error; 0 for a fixed one' }),
    interval_95: figure.meta({ description: 'Half width of the 95 % interval (Student’s t)' }),
    variance_inflation: figure,
    prior: z.object({ value: z.number(), error: z.number() }).nullable(),
  })
  .meta({ id: 'SolutionCoefficient' });
export type SolutionCoefficient = z.infer<typeof SolutionCoefficient>;

export const SolutionBand = z
  .object({
    outcome: z.enum(['determined', 'undetermined']),
    coefficients: z.array(SolutionCoefficient),
    covariance: z.array(z.array(z.number())).meta({ description: 'In the order of the coefficients' }),
    correlation: z.array(z.array(figure)),
    scatter: z.object({ observation: figure, frame: figure }),
    n_used: z.number().int(),
    n_rejected: z.number().int(),
    n_stars: z.number().int(),
    n_frames: z.number().int(),
    dof: figure,
    reduced_chi2: figure,
    condition_number: figure,
    airmass: Range,
    colour: Range,
    colour_index: z.string(),
    utc: z.object({ first: Utc, last: Utc }).nullable(),
    leave_one_star_out: figure,
    drift: z.object({ value: z.number(), error: z.number() }).nullable(),
    runs: figure,
    cross_checks: z.object({
      bouguer: z.array(
        z.object({ star: z.string(), extinction: z.number(), error: z.number(), n: z.number().int() }),
      ),
      high_low: z.object({ extinction: z.number(), error: z.number(), n: z.number().int() }).nullable(),
      colour_pairs: z.object({ colour_term: z.number(), error: z.number(), n: z.number().int() }).nullable(),
    }),
    warnings: z.array(z.string()).meta({ description: 'Findings on this band, in words' }),
  })
  .meta({ id: 'SolutionBand' });
export type SolutionBand = z.infer<typeof SolutionBand>;

export const SolutionFinding = z
  .object({
    weight: z.enum(['stop', 'caution', 'note']),
    kind: z.string(),
    band: Band.nullable(),
    night_date: CalendarDate.nullable(),
    coefficient: Coefficient.nullable(),
    reason: z.string(),
    remedy: z.string(),
  })
  .meta({ id: 'SolutionFinding' });
export type SolutionFinding = z.infer<typeof SolutionFinding>;

export const EvidenceItem = z
  .object({
    speaks: z.enum(['for', 'care', 'against']),
    kind: z.string(),
    band: Band.nullable(),
    words: z.string(),
  })
  .meta({ id: 'EvidenceItem' });
export type EvidenceItem = z.infer<typeof EvidenceItem>;

const BandsOfNight = z.partialRecord(Band, SolutionBand);

export const Solution = z
  .object({
    id: PublicId,
    number: z.number().int().meta({ description: 'Within its night, from 1' }),
    night: PublicId,
    night_date: CalendarDate,
    telescope: z.string(),
    state: SolutionState,
    outcome: z.enum(['determined', 'undetermined']).nullable().meta({ description: 'Null until solved' }),
    verdict: Verdict.nullable().meta({ description: 'Decided by a person' }),
    suggested_verdict: Verdict.nullable(),
    bands: BandsOfNight.meta({ description: 'Of its own night; empty until solved' }),
    joint_nights: z
      .array(z.object({ night: PublicId, date: CalendarDate, bands: BandsOfNight }))
      .meta({ description: 'Further nights that were solved with it' }),
    model: z.object({ options: SolveOptions, airmass_formula: AirmassFormula }),
    inputs: z.object({
      sets: z.array(z.object({ id: PublicId, name: z.string(), sha256: z.string() })),
      standards_source: z.string(),
      equipment_epoch: z.string().nullable(),
      hash: z.string().nullable().meta({ description: 'SHA-256 of the observations as the fit saw them' }),
    }),
    findings: z.array(SolutionFinding),
    evidence: z.array(EvidenceItem),
    n_observations: z.number().int(),
    n_used: z.number().int(),
    n_rejected: z.number().int(),
    n_stars: z.number().int(),
    n_frames: z.number().int(),
    software_version: z.string(),
    follows: PublicId.nullable().meta({ description: 'The solution that this one was made from' }),
    superseded_by: PublicId.nullable(),
    version: z.number().int().meta({ description: 'Grows with each change of state' }),
    created_by: z.string(),
    created_at: Utc,
    solved_at: Utc.nullable(),
    proposed: Who,
    approved: Who,
    withdrawn: Who,
    job: z
      .object({ id: PublicId, state: JobState, progress: z.number(), message: z.string() })
      .nullable()
      .meta({ description: 'The job that solves it' }),
    may: z
      .object({
        solve_again: z.boolean(),
        exclude: z.boolean(),
        propose: z.boolean(),
        approve: z.boolean(),
        withdraw: z.boolean(),
        comment: z.boolean(),
        why_not_approve: z.string().meta({ description: 'In words; empty where you may' }),
      })
      .meta({ description: 'What you may do with it as it stands' }),
  })
  .meta({ id: 'Solution', description: 'One fit of a night, as it was asked and what it found' });
export type Solution = z.infer<typeof Solution>;

export const SolutionObservation = z
  .object({
    observation: ObservationId,
    night_date: CalendarDate,
    frame: z.number().int().meta({ description: 'Number of the frame' }),
    star: z.string(),
    band: Band,
    utc_mid: Utc,
    airmass: z.number(),
    colour: figure,
    magnitude: figure.meta({ description: 'Published magnitude in the band' }),
    inst_mag: z.number(),
    inst_err: z.number(),
    residual: figure.meta({ description: 'Observed − fitted, mag' }),
    standardised: figure.meta({ description: 'The residual in its standard errors' }),
    weight: figure,
    leverage: figure,
    influence: figure.meta({ description: 'Cook’s distance' }),
    used: z.boolean(),
    reason: z.string().meta({ description: 'Why it is not used, or who kept it in; empty otherwise' }),
    decided_by: z.string().nullable().meta({ description: 'Name of the person; null for the fit' }),
  })
  .meta({ id: 'SolutionObservation' });
export type SolutionObservation = z.infer<typeof SolutionObservation>;

export const SolutionComment = z
  .object({
    act: z.enum(['comment', 'propose', 'approve', 'withdraw']),
    text: z.string(),
    by: z.string(),
    at: Utc,
  })
  .meta({ id: 'SolutionComment' });
export type SolutionComment = z.infer<typeof SolutionComment>;

const Comment = z
  .string()
  .trim()
  .max(2000, 'must be at most 2,000 characters long')
  .meta({ description: 'For the record' });
const Version = z
  .number()
  .int()
  .optional()
  .meta({ description: 'The version that you saw: refused if it has changed since' });

export const ProposeSolution = z.strictObject({
  comment: Comment.default(''),
  verdict: Verdict.optional().meta({ description: 'The suggested one, if you give none' }),
  version: Version,
});
export type ProposeSolution = z.output<typeof ProposeSolution>;
export const ApproveSolution = z.strictObject({ comment: Comment.default(''), version: Version });
export type ApproveSolution = z.output<typeof ApproveSolution>;
export const WithdrawSolution = z.strictObject({
  comment: line(2000).min(3, 'must say why, in a few words'),
  version: Version,
});
export type WithdrawSolution = z.output<typeof WithdrawSolution>;
export const AddComment = z.strictObject({ text: Comment.min(1, 'is empty') });
export type AddComment = z.output<typeof AddComment>;
export const ChangeExclusions = z.strictObject({
  observations: z.array(ObservationId).min(1, 'must name an observation').max(10_000),
  reason: Reason,
  restore: z.boolean().default(false).meta({ description: 'True: keep them in instead of out' }),
});
export type ChangeExclusions = z.output<typeof ChangeExclusions>;

export const QueuedSolution = z.object({ solution: PublicId, job: PublicId });
export type QueuedSolution = z.infer<typeof QueuedSolution>;
export const QueuedTransformation = z.object({ job: PublicId });
export type QueuedTransformation = z.infer<typeof QueuedTransformation>;

const SolutionParams = z.object({ id: PathId.meta({ description: 'Id of the solution' }) });
const tag = 'solutions';

export const solveNight = operation({
  id: 'solveNight',
  method: 'post',
  path: '/nights/{id}/solutions',
  tag,
  summary: 'Solve a night',
  description: 'Queues a fit of the night’s standards. A solve never changes an earlier solution.',
  params: NightParams,
  body: SolveOptions,
  answer: QueuedSolution,
  status: 202,
  faults: ['conflict'],
});
export const listSolutions = operation({
  id: 'listSolutions',
  method: 'get',
  path: '/nights/{id}/solutions',
  tag,
  summary: 'Solutions of a night, the newest first',
  params: NightParams,
  query: Page,
  answer: listOf(Solution),
});
export const getSolution = operation({
  id: 'getSolution',
  method: 'get',
  path: '/solutions/{id}',
  tag,
  summary: 'One solution',
  params: SolutionParams,
  answer: Solution,
});
export const listResiduals = operation({
  id: 'listResiduals',
  method: 'get',
  path: '/solutions/{id}/residuals',
  tag,
  summary: 'Every observation that the fit was given, in order of time',
  params: SolutionParams,
  query: Page.extend({ band: Band.optional() }),
  answer: listOf(SolutionObservation),
});
export const changeExclusions = operation({
  id: 'changeExclusions',
  method: 'post',
  path: '/solutions/{id}/exclusions',
  tag,
  summary: 'Keep observations out, or in, and solve again as a new draft',
  params: SolutionParams,
  body: ChangeExclusions,
  answer: QueuedSolution,
  status: 202,
  faults: ['conflict'],
});
export const listSolutionComments = operation({
  id: 'listSolutionComments',
  method: 'get',
  path: '/solutions/{id}/comments',
  tag,
  summary: 'What people said about a solution, the oldest first',
  params: SolutionParams,
  answer: listOf(SolutionComment),
});
export const addSolutionComment = operation({
  id: 'addSolutionComment',
  method: 'post',
  path: '/solutions/{id}/comments',
  tag,
  summary: 'Say something about a solution',
  params: SolutionParams,
  body: AddComment,
  answer: SolutionComment,
  status: 201,
});
export const proposeSolution = operation({
  id: 'proposeSolution',
  method: 'post',
  path: '/solutions/{id}/propose',
  tag,
  summary: 'Propose a solution for approval, with a verdict on the night',
  params: SolutionParams,
  body: ProposeSolution,
  answer: Solution,
  faults: ['conflict', 'stale'],
});
export const approveSolution = operation({
  id: 'approveSolution',
  method: 'post',
  path: '/solutions/{id}/approve',
  tag,
  summary: 'Approve a proposed solution',
  description:
    'The approved solution before it is superseded, the night becomes calibrated, the night’s targets are transformed, and the investigators get a mail. Of a night that is not photometric nothing is transformed; the mail says so.',
  params: SolutionParams,
  body: ApproveSolution,
  answer: Solution,
  faults: ['conflict', 'stale'],
});
export const withdrawSolution = operation({
  id: 'withdrawSolution',
  method: 'post',
  path: '/solutions/{id}/withdraw',
  tag,
  summary: 'Withdraw a solution, from any state',
  params: SolutionParams,
  body: WithdrawSolution,
  answer: Solution,
  faults: ['conflict', 'stale'],
});
export const transformAgain = operation({
  id: 'transformAgain',
  method: 'post',
  path: '/solutions/{id}/transform',
  tag,
  summary: 'Bring the night’s targets to the standard system after all',
  description:
    'An approval queues this by itself; here it is queued anew after its job was cancelled or has failed for good. Refused while nothing waits, while a job is at work on it, and unless the solution is approved.',
  params: SolutionParams,
  answer: QueuedTransformation,
  status: 202,
  faults: ['conflict'],
});
