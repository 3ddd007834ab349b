import 'server-only';
import type { SolutionFinding } from '@/lib/contracts/api/solution';
import type { SolutionChangeRow } from '@/lib/server/data/solution-changes';
import type { SolutionRow } from '@/lib/server/data/solutions';

export type SolutionChanges = SolutionChangeRow;

const again = 'Solve the night again to take it into account.';

/**
 * Cautions on what has changed beneath a solution. Nothing of it changes the solution itself, which stands as it was
 * solved: a person decides whether it still holds.
 */
export function changeFindings(row: SolutionRow, changes: SolutionChanges): readonly SolutionFinding[] {
  const found: SolutionFinding[] = [];
  const caution = (kind: string, reason: string, remedy: string): void => {
    found.push({
      weight: 'caution',
      kind,
      band: null,
      night_date: row.nightDate,
      coefficient: null,
      reason,
      remedy,
    });
  };
  if (row.reopenedAt !== null) {
    caution(
      'night-reopened',
      `The night was opened again after this solution was made, at ${row.reopenedAt.toISOString().slice(0, 16).replace('T', ' ')} UTC.`,
      'Look in the audit trail at what was changed, and solve again if it matters.',
    );
  }
  if (row.inputs.frameVersions !== null && Number(changes.frameVersions) !== row.inputs.frameVersions)
    caution('frames-corrected', 'Frames that it used have been corrected in the log since.', again);
  if (changes.refusedSets !== null) {
    caution(
      'set-taken-back',
      `Measurements that it used were taken back since: “${changes.refusedSets}”.`,
      'It cannot be proposed any more; solve the night again.',
    );
  }
  if (changes.newSets !== null)
    caution('newer-set', `Standards were uploaded since that it does not know: “${changes.newSets}”.`, again);
  if (changes.newTargets !== null && row.state === 'approved') {
    caution(
      'newer-targets',
      `Measurements of targets came after the approval and are not transformed: “${changes.newTargets}”.`,
      'Solve the night again and approve the new solution: its targets are then transformed with it.',
    );
  }
  return found;
}
