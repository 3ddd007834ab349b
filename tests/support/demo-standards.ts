import { observeNight, readDemoSky } from '@/db/seeders/demo/demo-nights';
import { readDemoWorld } from '@/db/seeders/demo/demo-world';
import { measure } from '@/db/seeders/demo/make-files';
import type { DemoStar, Measurement } from '@/db/seeders/demo/simulate-night';
import { airmassYoung1994 } from '@/lib/astro/airmass';
import { horizontalPlace } from '@/lib/astro/horizontal-place';
import { skyMoment } from '@/lib/astro/sky-moment';
import { bandPlace } from '@/lib/photometry/bands';
import { equalErrors } from '@/lib/photometry/simulate';
import type { StandardObservations } from '@/lib/photometry/standard-observations';

const hour_ms = 3_600_000;

/** What the standards of a night of the demo measured, and how to hand it to a fit. */
export async function demoStandards(date: string) {
  const world = await readDemoWorld();
  const sky = await readDemoSky(world, true);
  const plan = world.nights.nights.find((night) => night.date === date);
  if (plan === undefined) throw new Error(`The demo has no night ${date}.`);
  const mistaken = new Map(Object.entries(plan.mistaken ?? {}));
  const rows = measure(observeNight(plan, sky), sky, mistaken).filter(
    ({ frame }) => frame.type === 'standard',
  );
  const known = new Map<string, DemoStar>();
  for (const { frame } of rows) for (const star of sky.starsOf(frame)) known.set(star.name, star);
  const zero = rows.reduce((sum, { frame }) => sum + frame.utcMid / rows.length, 0);
  const airmassOf = ({ frame, ra, dec }: Measurement): number =>
    airmassYoung1994(
      horizontalPlace(skyMoment(world.observatory.site, frame.utcMid), ra, dec).zenithDistance,
    );
  const hoursOf = ({ frame }: Measurement): number => (frame.utcMid - zero) / hour_ms;

  const observationsOf = (all: readonly Measurement[]): StandardObservations => {
    const stars = [...new Set(all.map(({ star }) => star))];
    const frames = [...new Set(all.map(({ frame }) => frame))];
    const column = (name: 'V' | 'BV' | 'UB' | 'VR' | 'VI'): Float64Array =>
      Float64Array.from(stars, (star) => known.get(star)?.[name] ?? NaN);
    return {
      night: new Uint16Array(all.length),
      star: Uint32Array.from(all, ({ star }) => stars.indexOf(star)),
      frame: Uint32Array.from(all, ({ frame }) => frames.indexOf(frame)),
      band: Uint8Array.from(all, ({ frame }) => bandPlace[frame.band ?? 'V']),
      instMag: Float64Array.from(all, ({ instMag }) => instMag),
      instErr: Float64Array.from(all, ({ instErr }) => instErr),
      airmass: Float64Array.from(all, airmassOf),
      hours: Float64Array.from(all, hoursOf),
      overrule: new Uint8Array(all.length),
      starNames: stars,
      frameNumbers: Uint32Array.from(frames, ({ number }) => number),
      nightNames: [date],
      standards: { V: column('V'), BV: column('BV'), UB: column('UB'), VR: column('VR'), VI: column('VI') },
      standardErrors: equalErrors(stars.length, 0.003),
    };
  };
  return { plan, rows, known, airmassOf, hoursOf, observationsOf };
}
