import { yearsSinceJ2000 } from '@/lib/astro/proper-motion';
import type { CheckInputs } from '@/lib/server/reads/check-inputs';
import type { CheckOrder } from '../threads/check-measurements/messages';

/** What the thread is given: plain columns, which cross to it without an object a row. */
export function checkOrder(
  { set, night, instrument, frames, standards, mappings, targets }: CheckInputs,
  original: string,
  folder: string,
): CheckOrder {
  const column = (value: (row: (typeof standards)[number]) => number | null): Float64Array =>
    Float64Array.from(standards, (row) => value(row) ?? NaN);
  const [startsAt, endsAt] = [night.startsAt.getTime(), night.endsAt.getTime()];
  return {
    original,
    folder,
    kind: set.kind,
    tolerance: set.tolerance,
    mapping: set.mapping,
    remembered: mappings.map(({ headers, mapping }) => ({ headers, mapping })),
    frames,
    standards: {
      ids: Int32Array.from(standards, ({ id }) => id),
      names: standards.map(({ name }) => name),
      keys: standards.map(({ nameKey }) => nameKey),
      fields: standards.map(({ field }) => field),
      ra: column(({ ra }) => ra),
      dec: column(({ decl }) => decl),
      pmRa: column(({ pmRa }) => pmRa),
      pmDec: column(({ pmDec }) => pmDec),
      unusable: standards.map(({ isUsable, caution }) =>
        isUsable === 1 ? '' : caution || 'its source says so.',
      ),
    },
    site: {
      longitude: instrument.longitude,
      latitude: instrument.latitude,
      elevation: instrument.elevation,
    },
    name: set.name,
    targets,
    night: {
      startsAt,
      endsAt,
      isOpen: night.state === 'open',
      epoch_years: yearsSinceJ2000((startsAt + endsAt) / 2),
      bands: instrument.filters.map(({ band }) => band),
      telescope: instrument.name,
    },
  };
}
