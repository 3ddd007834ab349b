import { formatCount } from '@/lib/contracts/format-figure';
import { hasEnded } from '@/lib/contracts/api/job';
import type { Solution } from '@/lib/contracts/api/solution';
import { bands } from '@/lib/contracts/bands';
import type { SolveOptions } from '@/lib/contracts/solve-options';

export const airmassWords: Readonly<Record<SolveOptions['airmass_formula'], string>> = {
  young1994: 'Young 1994',
  hardie1962: 'Hardie 1962',
  kastenYoung1989: 'Kasten and Young 1989',
  pickering2002: 'Pickering 2002',
  secZ: 'the secant of the zenith distance',
};

const many = (count: number, noun: string): string =>
  `${formatCount(count)} ${noun}${count === 1 ? '' : 's'}`;

/** `B, V and R` */
export function listWords(names: readonly string[]): string {
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1) ?? ''}`;
}

/** One line of what a solution is: `Mixed model, B and V, airmass after Young 1994, 212 observations of …`. */
export function summaryWords(solution: Solution): string {
  const solved = bands.filter((band) => solution.bands[band] !== undefined);
  const { n_observations, n_stars, n_frames, n_rejected, joint_nights, model } = solution;
  return [
    'Mixed model',
    ...(solved.length === 0 ? [] : [listWords(solved)]),
    `airmass after ${airmassWords[model.airmass_formula]}`,
    ...(joint_nights.length === 0 ? [] : [`with ${many(joint_nights.length, 'further night')}`]),
    ...(solution.outcome === null
      ? []
      : [
          `${many(n_observations, 'observation')} of ${many(n_stars, 'standard')} on ${many(n_frames, 'frame')}`,
          `${formatCount(n_rejected)} rejected`,
        ]),
  ].join(', ');
}

/** A colour index as people write it: `B−V` of `BV`. */
export function indexWords(index: string): string {
  return /^[A-Z]{2}$/.test(index) ? `${index.slice(0, 1)}−${index.slice(1)}` : index;
}

export type SolveStanding = 'running' | 'not finished' | 'undetermined' | 'solved';

/** How far a solution has come. */
export function standingOf({ outcome, job }: Solution): SolveStanding {
  if (outcome === 'determined') return 'solved';
  if (outcome === 'undetermined') return 'undetermined';
  return job !== null && !hasEnded(job.state) ? 'running' : 'not finished';
}
