import type { Issue } from '@/lib/faults/fault';

/** How many issues of one table are kept word for word; the rest are counted. */
export const keptIssues = 1000;

/** What is wrong and what to do about it. */
export interface IssueText {
  readonly message: string;
  readonly remedy: string;
}

/** Collects what is wrong with a table: the first thousand as they are, all of them as a number. */
export interface IssueList {
  readonly add: (issue: Issue) => void;
  readonly total: () => number;
  readonly kept: () => readonly Issue[];
}

/** Longest excerpt of a file that an issue repeats. [characters] */
const longestValue = 200;

/** A value from a file, short enough to show, with control characters made visible. */
export function excerpt(text: string): string {
  const visible = text.slice(0, longestValue + 1).replace(/[\u0000-\u001f\u007f]/g, '␣');
  return visible.length > longestValue ? `${visible.slice(0, longestValue - 1)}…` : visible;
}

export function issueList(): IssueList {
  const issues: Issue[] = [];
  let total = 0;
  return {
    add: (issue) => {
      total += 1;
      if (issues.length < keptIssues) issues.push(issue);
    },
    total: () => total,
    kept: () => issues,
  };
}
