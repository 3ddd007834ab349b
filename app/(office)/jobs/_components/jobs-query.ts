import { JobState } from '@/lib/contracts/api/job';
import { isJobKind, type JobKind } from '@/lib/contracts/job-kinds';
import { PublicId } from '@/lib/contracts/common';

/** What the list of jobs is narrowed to, as its address says it. What cannot be read is left out. */
export interface JobsQuery {
  readonly state?: JobState;
  readonly kind?: JobKind;
  readonly after?: string;
}

type SearchValues = Readonly<Record<string, string | readonly string[] | undefined>>;

export const jobsPerPage = 50;

export function jobsQuery(values: SearchValues): JobsQuery {
  const state = JobState.safeParse(values['state']);
  const after = PublicId.safeParse(values['after']);
  const kind = values['kind'];
  return {
    ...(state.success ? { state: state.data } : {}),
    ...(typeof kind === 'string' && isJobKind(kind) ? { kind } : {}),
    ...(after.success ? { after: after.data } : {}),
  };
}

/** The query of an address: the present one with some of it changed; undefined takes a part out. */
export function jobsSearch(
  query: JobsQuery,
  change: Partial<Record<keyof JobsQuery, string | undefined>> = {},
): string {
  const params = new URLSearchParams();
  for (const [name, value] of Object.entries({ ...query, ...change })) {
    if (value !== undefined) params.set(name, value);
  }
  const search = params.toString();
  return search === '' ? '' : `?${search}`;
}
