import 'server-only';
import { calibratedCautions } from '@/lib/contracts/calibrated-columns';
import { coefficientWords, type ApiCoefficient } from '@/lib/contracts/coefficients';
import { formatPlain, formatWithError } from '@/lib/contracts/format-figure';
import { renderLetter, type RenderedLetter } from './letter';

export interface CalibratedBand {
  readonly band: string;
  readonly coefficients: readonly {
    readonly name: ApiCoefficient;
    readonly value: number | null;
    readonly error: number | null;
    readonly status: 'free' | 'fixed' | 'prior';
  }[];
  /** [mag] */
  readonly scatterObservation: number | null;
  readonly scatterFrame: number | null;
  readonly nUsed: number;
}

export interface NightCalibrated {
  readonly name: string;
  /** The night in words: `3 November 2026, Larkspur 0.8 m`. */
  readonly night: string;
  readonly programme: string;
  readonly verdict: string;
  /** Number of the solution within its night. */
  readonly solution: number;
  readonly bands: readonly CalibratedBand[];
  readonly nStars: number;
  readonly nMeasurements: number;
  readonly nLeftOut: number;
  /** Whether magnitudes of an earlier solution were sent word of before. */
  readonly isAgain: boolean;
  /** The page of results. */
  readonly href: string;
}

const figure = (n: number): string => n.toLocaleString('en-GB');
function coefficientAsText({ value, error, status }: CalibratedBand['coefficients'][number]): string {
  if (value === null) return 'not determined';
  return status === 'fixed' ? `${formatPlain(value)}, held fixed` : formatWithError(value, error, 4);
}

const mag = (value: number | null): string => (value === null ? '' : `${value.toFixed(4)} mag`);

/** To PI and co-investigators, when the magnitudes of their programme's targets are there. */
export function nightCalibratedMail(
  calibrated: NightCalibrated,
): RenderedLetter & { readonly kind: 'night-calibrated' } {
  const { bands, nStars, nLeftOut, isAgain } = calibrated;
  const again = isAgain
    ? ' They take the place of those made with an earlier solution, which stay readable under its number.'
    : '';
  const letter = renderLetter({
    subject: `${isAgain ? 'Calibrated anew' : 'Calibrated'}: ${calibrated.programme}, ${calibrated.night}`,
    name: calibrated.name,
    parts: [
      {
        kind: 'text',
        text: `The magnitudes of your programme’s targets in this night are on the standard system.${again}`,
      },
      {
        kind: 'facts',
        facts: [
          ['Night', calibrated.night],
          ['Programme', calibrated.programme],
          ['Verdict', calibrated.verdict],
          ['Solution', `number ${calibrated.solution} of the night`],
          ['Stars', figure(nStars)],
          ['Measurements used', figure(calibrated.nMeasurements)],
          ...(nLeftOut === 0 ? [] : ([['Measurements left out', figure(nLeftOut)]] as const)),
        ],
      },
      {
        kind: 'table',
        caption: 'Coefficients with their standard errors',
        head: ['Band', 'Coefficient', 'Value', 'Unit'],
        rows: bands.flatMap(({ band, coefficients }) =>
          coefficients.map((coefficient) => [
            band,
            coefficientWords[coefficient.name].title,
            coefficientAsText(coefficient),
            coefficientWords[coefficient.name].unit,
          ]),
        ),
      },
      {
        kind: 'table',
        caption: 'Scatter of the standards',
        head: ['Band', 'Observation', 'Frame', 'Observations used'],
        rows: bands.map(({ band, scatterObservation, scatterFrame, nUsed }) => [
          band,
          mag(scatterObservation),
          mag(scatterFrame),
          figure(nUsed),
        ]),
      },
      { kind: 'link', label: 'The magnitudes, as a page and to download', href: calibrated.href },
      { kind: 'text', text: calibratedCautions(calibrated.verdict).join('\n') },
    ],
  });
  return { kind: 'night-calibrated', ...letter };
}
