import 'server-only';
import { renderLetter, type RenderedLetter } from './letter';

export interface MeasurementsWaiting {
  readonly name: string;
  /** The night in words: `3 November 2026, Larkspur 0.8 m`. */
  readonly night: string;
  readonly set: string;
  readonly uploadedBy: string;
  readonly nRows: number;
  /** Rows matched to a standard star. */
  readonly nMatched: number;
  /** The set's page. */
  readonly href: string;
}

const figure = (n: number): string => n.toLocaleString('en-GB');

/** To the photometrists, when a table was taken. */
export function measurementsWaitingMail(
  waiting: MeasurementsWaiting,
): RenderedLetter & { readonly kind: 'measurements-waiting' } {
  const letter = renderLetter({
    subject: `Measurements waiting: ${waiting.night}`,
    name: waiting.name,
    parts: [
      { kind: 'text', text: 'A measurement set has been checked, and waits for calibration.' },
      {
        kind: 'facts',
        facts: [
          ['Night', waiting.night],
          ['Set', waiting.set],
          ['Uploaded by', waiting.uploadedBy],
          ['Rows', figure(waiting.nRows)],
          ['Matched to standards', figure(waiting.nMatched)],
        ],
      },
      { kind: 'link', label: 'The set: what matched, what did not and why', href: waiting.href },
    ],
  });
  return { kind: 'measurements-waiting', ...letter };
}
