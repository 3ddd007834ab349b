import 'server-only';
import { renderLetter, type RenderedLetter } from './letter';

export interface SolutionProposed {
  readonly name: string;
  /** The night in words: `3 November 2026, Larkspur 0.8 m`. */
  readonly night: string;
  /** Within its night. */
  readonly number: number;
  readonly proposedBy: string;
  readonly verdict: string;
  /** What the proposer says; may be empty. */
  readonly comment: string;
  readonly nUsed: number;
  readonly nObservations: number;
  /** The solution's page. */
  readonly href: string;
}

const figure = (n: number): string => n.toLocaleString('en-GB');

/** To the other photometrists, when somebody proposed a solution. */
export function solutionProposedMail(
  proposed: SolutionProposed,
): RenderedLetter & { readonly kind: 'solution-proposed' } {
  const letter = renderLetter({
    subject: `Solution to approve: ${proposed.night}`,
    name: proposed.name,
    parts: [
      { kind: 'text', text: `${proposed.proposedBy} proposes a solution, and asks for a second judgement.` },
      {
        kind: 'facts',
        facts: [
          ['Night', proposed.night],
          ['Solution', String(proposed.number)],
          ['Verdict', proposed.verdict],
          ['Observations used', `${figure(proposed.nUsed)} of ${figure(proposed.nObservations)}`],
          ...(proposed.comment === '' ? [] : [['Comment', proposed.comment] as const]),
        ],
      },
      { kind: 'link', label: 'The solution: residuals, evidence and decision', href: proposed.href },
    ],
  });
  return { kind: 'solution-proposed', ...letter };
}
