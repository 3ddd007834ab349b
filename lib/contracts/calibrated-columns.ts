import { namesOfFlags } from '@/lib/photometry/calibrated-flags';

/** A column of calibrated magnitudes: what exports write above it and pages say of it. */
export interface CalibratedColumnWords {
  readonly name: string;
  /** Empty for a text. */
  readonly unit: string;
  readonly meaning: string;
  /** Digits after the point; null for texts and counts. */
  readonly decimals: number | null;
}

const quantities = [
  { name: 'V', words: 'V magnitude' },
  { name: 'B', words: 'B magnitude' },
  { name: 'BV', words: 'Colour index B−V' },
  { name: 'UB', words: 'Colour index U−B' },
  { name: 'VR', words: 'Colour index V−R' },
  { name: 'VI', words: 'Colour index V−I' },
] as const;

const errors = {
  '': '',
  _random: ': random error, of measurement and scatter; falls as measurements are averaged',
  _systematic: ': systematic error, of the coefficients; common to the night',
  _total: ': total error, root of the sum of squares of random and systematic',
} as const;

const text = (name: string, meaning: string): CalibratedColumnWords => ({
  name,
  unit: '',
  meaning,
  decimals: null,
});
const number = (
  name: string,
  [unit, meaning, decimals]: readonly [string, string, number | null],
): CalibratedColumnWords => ({ name, unit, meaning, decimals });

/** In the order of every export. */
export const calibratedColumns: readonly CalibratedColumnWords[] = [
  text('star', 'Name as measured, or made from the position where the table had none'),
  number('ra', ['deg', 'Right ascension, J2000, mean of the measurements', 7]),
  number('dec', ['deg', 'Declination, J2000, mean of the measurements', 7]),
  ...['U', 'B', 'V', 'R', 'I'].map((band) => number(`n_${band}`, ['', `Measurements used in ${band}`, null])),
  ...quantities.flatMap(({ name, words }) =>
    Object.entries(errors).map(([suffix, more]) =>
      number(`${name}${suffix}`, [
        'mag',
        suffix === '' ? `${words} on the standard system` : `${words}${more}`,
        5,
      ]),
    ),
  ),
  number('bjd_tdb', ['d', 'Mean mid-exposure of the measurements used, barycentric Julian date in TDB', 6]),
  number('airmass', ['1', 'Mean airmass of the measurements used', 4]),
  text('flags', 'Cautions by name, parted by a semicolon; empty without any'),
  text('programme', 'Code of the programme'),
  text('solution', 'Id of the solution'),
  text('night', 'Evening date of the night'),
];

/** Names of the cautions of a bit field. */
export const flagNames = (bits: number): readonly string[] => namesOfFlags(bits);

/** What everybody should know who uses calibrated magnitudes; pages, mails and exports say the same. */
export function calibratedCautions(verdict: string | null): readonly string[] {
  const careful = {
    'usable with care':
      'This night is usable with care: read the evidence on its solution before you publish.',
    'not photometric':
      'This night is not photometric: its magnitudes can be wrong by more than their errors say.',
  };
  return [
    ...(verdict !== null && Object.hasOwn(careful, verdict)
      ? [careful[verdict as keyof typeof careful]]
      : []),
    'A calibrated magnitude is only as good as its solution: a colour, airmass or time outside the range of the standards is flagged.',
    'The verdict on a night is a person’s decision on evidence, not a measurement.',
  ];
}

/** The equations of a solution and of its magnitudes, as exports state them. */
export const calibratedFormulas: readonly string[] = [
  'm_inst = M + Z + k1 X + T C + k2 X C + tau t + kappa t X + T2 C^2',
  'M standard magnitude; C colour index (U: U-B; B and V: B-V; R: V-R; I: V-I); X airmass; t hours from the mean time of the standards',
  'Z zero_point; k1 extinction; T colour_term; k2 second_order_extinction; tau drift; kappa extinction_drift; T2 colour_term_2',
  'all measurements of a star in the night by least squares for its magnitude and colours, weights 1/(error^2 + scatter_observation^2 + scatter_frame^2)',
];
