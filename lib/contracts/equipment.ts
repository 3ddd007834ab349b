import { z } from 'zod';
import { bands, Band, type Band as BandName } from './bands';
import { line } from './common';
import { figure, optionalDate, optionalFigure, tick } from './form-fields';

/** Mean extinction of a site, per band [mag per airmass]. A solve may take it as a prior. */
export const MeanExtinction = z.partialRecord(
  Band,
  z.object({ mean: z.number(), sigma: z.number(), source: z.string() }),
);
export type MeanExtinction = z.output<typeof MeanExtinction>;

/** Recorded colour terms of an epoch, per band [mag per mag]. A solve may take them as priors. */
export const ColourTerms = z.partialRecord(Band, z.object({ value: z.number(), error: z.number() }));
export type ColourTerms = z.output<typeof ColourTerms>;

const isTimezone = (name: string): boolean => {
  try {
    return new Intl.DateTimeFormat('en', { timeZone: name }).resolvedOptions().timeZone !== '';
  } catch {
    // The only way to ask: an unknown name is refused by an error.
    return false;
  }
};

const Name = line(120).min(1, 'is missing');
const Code = z
  .string()
  .trim()
  .toLowerCase()
  .regex(/^[a-z0-9][a-z0-9-]{0,31}$/, 'must be 1 to 32 letters, digits or hyphens');
export const TelescopeCode = z.string().min(1).max(32);

type Fields<T> = Record<string, z.ZodType<T>>;

/** One optional figure per band, under `PREFIXband`. */
const perBand = <S extends z.ZodType>(prefix: string, schema: S): Record<string, S> =>
  Object.fromEntries(bands.map((band) => [`${prefix}${band}`, schema]));

type Values = Readonly<Record<string, unknown>>;
const numberAt = (values: Values, name: string): number | null => {
  const value = values[name];
  return typeof value === 'number' ? value : null;
};

interface Pair {
  readonly value: number;
  readonly error: number;
}

/** Value and error of each band that has both; a half is refused. */
function pairs(
  values: Values,
  names: readonly [string, string],
  context: z.RefinementCtx,
): ReadonlyMap<BandName, Pair> {
  const found = new Map<BandName, Pair>();
  for (const band of bands) {
    const value = numberAt(values, `${names[0]}${band}`);
    const error = numberAt(values, `${names[1]}${band}`);
    if (value === null && error === null) continue;
    if (value === null || error === null) {
      const missing = value === null ? 0 : 1;
      context.addIssue({
        code: 'custom',
        path: [`${names[missing]}${band}`],
        message: missing === 0 ? 'is missing beside its error' : 'is missing: a value needs its error',
      });
      continue;
    }
    found.set(band, { value, error });
  }
  return found;
}

export const ChangeSite = z
  .object({
    /** The site's present name; empty for a new one. */
    site: z.string().max(120),
    name: Name,
    longitude: figure({ min: -180, max: 180, unit: 'deg' }),
    latitude: figure({ min: -90, max: 90, unit: 'deg' }),
    elevation: figure({ min: -500, max: 9000, unit: 'm' }),
    timezone: z.string().trim().refine(isTimezone, 'is not a time zone such as Atlantic/Canary'),
    extinctionSource: line(200),
    ...(perBand('mean', optionalFigure({ min: 0, max: 3, unit: 'mag per airmass' })) as Fields<
      number | null
    >),
    ...(perBand('sigma', optionalFigure({ min: 0.001, max: 1, unit: 'mag per airmass' })) as Fields<
      number | null
    >),
  })
  .transform((values, context) => {
    const { site, name, longitude, latitude, elevation, timezone, extinctionSource } = values;
    const known = pairs(values, ['mean', 'sigma'], context);
    const meanExtinction: MeanExtinction = Object.fromEntries(
      [...known].map(([band, { value, error }]) => [
        band,
        { mean: value, sigma: error, source: extinctionSource },
      ]),
    );
    return { site, name, longitude, latitude, elevation, timezone, meanExtinction };
  });

export const ChangeTelescope = z.object({
  /** The telescope's code; empty for a new one. */
  telescope: z.string().max(32),
  code: Code,
  name: Name,
  site: z.string().min(1, 'is missing').max(120),
  aperture: figure({ min: 0.01, max: 100, unit: 'm' }),
  minAltitude: figure({ min: 0, max: 90, unit: 'deg' }),
  retiredOn: optionalDate,
});

export const ChangeCamera = z.object({
  telescope: TelescopeCode,
  /** The camera's present name; empty for a new one. */
  camera: z.string().max(120),
  name: Name,
  width: figure({ min: 1, max: 100_000, unit: 'pixels', whole: true }),
  height: figure({ min: 1, max: 100_000, unit: 'pixels', whole: true }),
  pixelScale: figure({ min: 0.001, max: 1000, unit: 'arcsec per pixel' }),
  gain: figure({ min: 0.001, max: 1000, unit: 'electrons per count' }),
  readNoise: figure({ min: 0, max: 1000, unit: 'electrons' }),
  saturation: figure({ min: 1, max: 1e9, unit: 'counts' }),
});

export const ChangeFilters = z
  .object({
    telescope: TelescopeCode,
    ...(Object.fromEntries(bands.map((band) => [`has${band}`, tick])) as Fields<boolean>),
    ...(Object.fromEntries(bands.map((band) => [`name${band}`, line(120).default('')])) as Fields<string>),
    ...(perBand('exposure', optionalFigure({ min: 0.001, max: 86_400, unit: 's' })) as Fields<number | null>),
  })
  .transform((values: Values & { readonly telescope: string }) => ({
    telescope: values.telescope,
    filters: bands
      .filter((band) => values[`has${band}`] === true)
      .map((band) => ({
        band,
        name: String(values[`name${band}`]) === '' ? band : String(values[`name${band}`]),
        defaultExposure: numberAt(values, `exposure${band}`),
      })),
  }));

export const ChangeEpoch = z
  .object({
    telescope: TelescopeCode,
    /** The epoch's present first day; empty for a new one. */
    epoch: z.string().max(10),
    camera: z.string().min(1, 'is missing').max(120),
    startsOn: z.string().trim().pipe(z.iso.date('must be a date such as 2026-11-03')),
    endsOn: optionalDate,
    description: line(500).min(1, 'is missing'),
    ...(perBand('term', optionalFigure({ min: -2, max: 2, unit: 'mag per mag' })) as Fields<number | null>),
    ...(perBand('error', optionalFigure({ min: 0.0001, max: 2, unit: 'mag per mag' })) as Fields<
      number | null
    >),
  })
  .transform((values, context) => {
    const { telescope, epoch, camera, startsOn, endsOn, description } = values;
    if (endsOn !== null && endsOn <= startsOn) {
      context.addIssue({ code: 'custom', path: ['endsOn'], message: 'must be after the first day' });
    }
    const colourTerms: ColourTerms = Object.fromEntries(pairs(values, ['term', 'error'], context));
    return { telescope, epoch, camera, startsOn, endsOn, description, colourTerms };
  });
