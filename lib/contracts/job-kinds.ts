/** Every kind of job, and how people call it. What goes in and comes out is in lib/server/jobs/kinds.ts. */
export const jobTitles = {
  'check-measurements': 'Check measurements',
  'send-mail': 'Send mail',
  'solve-night': 'Solve a night',
  'transform-targets': 'Transform target measurements',
  tidy: 'Remove what has expired',
} as const;

export type JobKind = keyof typeof jobTitles;
export const jobKindNames = Object.keys(jobTitles) as readonly JobKind[];
export const isJobKind = (name: string): name is JobKind => Object.hasOwn(jobTitles, name);
