import 'server-only';
import type { Solution, SolutionBand, SolutionFinding } from '@/lib/contracts/api/solution';
import type { Settings } from '@/lib/contracts/settings';
import type { BandRow } from '@/lib/server/data/solution-bands';
import type { StoredExclusion } from '@/lib/server/data/solution-writes';
import type { SolutionRow, SolveJobRow } from '@/lib/server/data/solutions';
import type { Caller } from '@/lib/server/policy/caller';
import { may, type Subject } from '@/lib/server/policy/matrix';
import { changeFindings, type SolutionChanges } from './solution-changes';

export interface SolutionContext {
  readonly bands: readonly BandRow[];
  readonly exclusions: readonly StoredExclusion[];
  readonly job: SolveJobRow | undefined;
  readonly changes: SolutionChanges | undefined;
  /** Nights that the reader may see: a joint solution shows nothing of others. */
  readonly visibleNights: ReadonlySet<number>;
  readonly subject: Subject;
  readonly settings: Settings;
}

const utc = (instant: Date): string => instant.toISOString();
const who = (name: string | null, at: Date | null): Solution['proposed'] =>
  name === null || at === null ? null : { name, at: utc(at) };

/** A solution as this caller sees it. */
export function shownSolution(caller: Caller, row: SolutionRow, context: SolutionContext): Solution {
  const { job } = context;
  const bands = context.bands.filter(({ nightId }) => context.visibleNights.has(nightId));
  const jointNights = new Map(
    bands
      .filter(({ nightId }) => nightId !== row.nightId)
      .map(({ nightId, nightPublicId, nightDate }) => [nightId, { night: nightPublicId, date: nightDate }]),
  );
  const dates = new Set([row.nightDate, ...bands.map(({ nightDate }) => nightDate)]);
  const findings = (row.findings ?? []).filter(({ night_date: date }) => date === null || dates.has(date));
  return {
    id: row.publicId,
    number: row.number,
    night: row.nightPublicId,
    night_date: row.nightDate,
    telescope: row.telescope,
    state: row.state,
    outcome: row.outcome,
    verdict: row.verdict,
    suggested_verdict: row.suggestedVerdict,
    bands: bandsShown(bands.filter(({ nightId }) => nightId === row.nightId)),
    joint_nights: [...jointNights].map(([nightId, night]) => ({
      ...night,
      bands: bandsShown(bands.filter((band) => band.nightId === nightId)),
    })),
    model: {
      options: { ...row.model.options, exclusions: exclusionsShown(context.exclusions) },
      airmass_formula: row.model.airmassFormula,
    },
    inputs: {
      sets: [...row.inputs.sets],
      standards_source: row.inputs.standardsSource,
      equipment_epoch: row.inputs.equipmentEpoch,
      hash: row.inputHash,
    },
    findings: [...changesOf(row, context), ...findings],
    evidence: [...(row.evidence ?? [])],
    n_observations: row.nObservations,
    n_used: row.nUsed,
    n_rejected: row.nObservations - row.nUsed,
    n_stars: row.nStars,
    n_frames: row.nFrames,
    software_version: row.softwareVersion,
    follows: row.follows,
    superseded_by: row.supersededBy,
    version: row.version,
    created_by: row.createdBy,
    created_at: utc(row.createdAt),
    solved_at: row.solvedAt && utc(row.solvedAt),
    proposed: who(row.proposedBy, row.proposedAt),
    approved: who(row.approvedBy, row.approvedAt),
    withdrawn: who(row.withdrawnBy, row.withdrawnAt),
    job: job ? { id: job.publicId, state: job.state, progress: job.progress, message: job.message } : null,
    may: mayOf(caller, row, context),
  };
}

/** What a person should know that came after the fit; nobody is to decide on it any more once it is out of use. */
function changesOf(row: SolutionRow, { changes }: SolutionContext): readonly SolutionFinding[] {
  if (row.outcome === null || row.state === 'superseded' || row.state === 'withdrawn') return [];
  return changes === undefined ? [] : changeFindings(row, changes);
}

const exclusionsShown = (rows: readonly StoredExclusion[]): Solution['model']['options']['exclusions'] =>
  rows.map(({ set, rowNo, reason, isExcluded }) => ({
    observation: `${set}.${rowNo}`,
    reason,
    restore: !isExcluded,
  }));

const bandsShown = (rows: readonly BandRow[]): Solution['bands'] =>
  Object.fromEntries(rows.map((row) => [row.band, shownBand(row)]));

const range = (min: number | null, max: number | null): SolutionBand['airmass'] =>
  min === null || max === null ? null : { min, max };

function shownBand(row: BandRow): SolutionBand {
  return {
    outcome: row.outcome,
    coefficients: row.coefficients.map((coefficient) => ({
      name: coefficient.name,
      status: coefficient.status,
      value: coefficient.value,
      error: coefficient.error,
      interval_95: coefficient.interval95,
      variance_inflation: coefficient.varianceInflation,
      prior:
        coefficient.priorValue === null || coefficient.priorError === null
          ? null
          : { value: coefficient.priorValue, error: coefficient.priorError },
    })),
    covariance: row.covariance.map((line) => [...line]),
    correlation: row.correlation.map((line) => [...line]),
    scatter: { observation: row.scatterObservation, frame: row.scatterFrame },
    n_used: row.nUsed,
    n_rejected: row.nRejected,
    n_stars: row.nStars,
    n_frames: row.nFrames,
    dof: row.dof,
    reduced_chi2: row.reducedChi2,
    condition_number: row.conditionNumber,
    airmass: range(row.airmassMin, row.airmassMax),
    colour: range(row.colourMin, row.colourMax),
    colour_index: row.colourIndex,
    utc:
      row.utcFirst === null || row.utcLast === null
        ? null
        : { first: utc(row.utcFirst), last: utc(row.utcLast) },
    leave_one_star_out: row.leaveOneStarOut,
    drift:
      row.driftValue === null || row.driftError === null
        ? null
        : { value: row.driftValue, error: row.driftError },
    runs: row.runs,
    cross_checks: row.crossChecks,
    warnings: [...row.warnings],
  };
}

function mayOf(caller: Caller, row: SolutionRow, { subject, settings }: SolutionContext): Solution['may'] {
  const isOpen = row.nightState === 'open';
  const isOwn = row.proposedById !== null && row.proposedById === caller.personId;
  const approves = row.state === 'proposed' && may(caller, 'solution.approve', subject);
  let whyNot = '';
  if (approves && isOpen) whyNot = 'The night is open: close it first.';
  else if (approves && isOwn && settings.secondApprover)
    whyNot = 'You proposed it, so another photometrist must approve it.';
  else if (row.state === 'proposed' && !approves) whyNot = 'A photometrist approves it.';
  return {
    solve_again: may(caller, 'solution.solve', subject),
    exclude: row.outcome !== null && may(caller, 'solution.exclude', subject),
    propose:
      row.state === 'draft' &&
      row.outcome === 'determined' &&
      !isOpen &&
      may(caller, 'solution.propose', subject),
    approve: approves && whyNot === '',
    withdraw: row.state !== 'withdrawn' && may(caller, 'solution.withdraw', subject),
    comment: may(caller, 'solution.comment', subject),
    why_not_approve: whyNot,
  };
}
