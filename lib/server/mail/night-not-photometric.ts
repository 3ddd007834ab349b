import 'server-only';
import { renderLetter, type RenderedLetter } from './letter';

export interface NightNotPhotometric {
  readonly name: string;
  /** The night in words: `3 November 2026, Larkspur 0.8 m`. */
  readonly night: string;
  /** Codes of the reader's programmes whose targets were measured in the night. */
  readonly programmes: readonly string[];
  /** Number of the solution within its night. */
  readonly solution: number;
  readonly proposedBy: string;
  /** What the proposer said; may be empty. */
  readonly proposal: string;
  readonly approvedBy: string;
  /** What the approver said; may be empty. */
  readonly comment: string;
  /** What speaks against the night, in sentences; may be empty. */
  readonly evidence: readonly string[];
  /** Whether there are magnitudes by an earlier solution of the night. */
  readonly hasEarlier: boolean;
  /** The solution's page. */
  readonly href: string;
  /** The page of the night's measurements. */
  readonly measurements: string;
}

const said = (by: string, comment: string): string => (comment === '' ? by : `${by}: “${comment}”`);

/** To PI and co-investigators, when a night is approved as one that gives no magnitudes. */
export function nightNotPhotometricMail(
  night: NightNotPhotometric,
): RenderedLetter & { readonly kind: 'night-not-photometric' } {
  const { programmes, proposedBy, approvedBy, evidence } = night;
  const earlier = night.hasEarlier
    ? ' Those made with an earlier solution are superseded; they stay readable under its number.'
    : '';
  const whom = proposedBy === approvedBy ? approvedBy : `${proposedBy} or ${approvedBy}`;
  const letter = renderLetter({
    subject: `Not photometric: ${night.night}`,
    name: night.name,
    parts: [
      {
        kind: 'text',
        text: `The night of ${night.night}, was judged not photometric, so no magnitudes on the standard system were derived for the targets of your programme${programmes.length === 1 ? '' : 's'}.${earlier}`,
      },
      {
        kind: 'facts',
        facts: [
          ['Night', night.night],
          [programmes.length === 1 ? 'Programme' : 'Programmes', programmes.join(', ')],
          ['Solution', `number ${night.solution} of the night`],
          ['Proposed by', said(proposedBy, night.proposal)],
          ['Approved by', said(approvedBy, night.comment)],
          ...(evidence.length === 0 ? [] : ([['Evidence', evidence.join(' ')]] as const)),
        ],
      },
      { kind: 'link', label: 'The solution: residuals and evidence', href: night.href },
      {
        kind: 'text',
        text: `The instrumental measurements stay available as they are, and differences between stars on the same frame may still be of use. If you doubt the judgement, ask ${whom}: the night can be solved and judged again.`,
      },
      { kind: 'link', label: 'The night’s measurements', href: night.measurements },
    ],
  });
  return { kind: 'night-not-photometric', ...letter };
}
