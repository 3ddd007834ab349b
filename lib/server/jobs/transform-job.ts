import 'server-only';
import type { SolutionRow } from '@/lib/server/data/solutions';
import type { NewJob } from './enqueue';

/** The job that brings the targets of a solution's night to the standard system: one at a time. */
export const transformJob = (
  solution: Pick<SolutionRow, 'publicId' | 'nightId' | 'nightPublicId'>,
): NewJob<'transform-targets'> & { readonly dedupeKey: string } => ({
  kind: 'transform-targets',
  payload: { solution: solution.publicId, night: solution.nightPublicId },
  dedupeKey: `transform-targets:${solution.publicId}`,
  nightId: solution.nightId,
});
