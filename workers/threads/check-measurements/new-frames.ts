import { frameGeometry } from '@/lib/astro/frame-geometry';
import { separation } from '@/lib/astro/separation';
import { directionOf, placeOf } from '@/lib/astro/vector';
import type { FrameType } from '@/lib/contracts/bands';
import type { NewFrame } from '@/lib/contracts/measurement-check';
import type { StandardMatch } from '@/lib/photometry/match-standards';
import type { RegisteredFrame } from './frame-register';
import type { CheckOrder } from './messages';
import type { StarRegister } from './star-register';

/** A frame shows a programme's target when its middle lies within this of it. [deg]; our own rule */
const targetReach = 0.5;

/** What the rows of a frame tell of where it looked. */
interface Seen {
  readonly sum: { x: number; y: number; z: number };
  readonly fields: Map<string, number>;
}

interface Found {
  readonly frames: readonly RegisteredFrame[];
  readonly matches: readonly StandardMatch[];
}

/** The frames that are to be created: with the middle of their stars, the field of their standards, and their geometry. */
export function newFrames(order: CheckOrder, stars: StarRegister, found: Found): readonly NewFrame[] {
  const first = order.frames.length;
  if (found.frames.length === first) return [];
  const seen = found.frames.slice(first).map((): Seen => ({ sum: { x: 0, y: 0, z: 0 }, fields: new Map() }));
  for (let row = 0; row < stars.rows(); row += 1) {
    const frame = seen[stars.frameOfRow(row) - first];
    if (frame) look(order, frame, placeOfStar(order, stars, found.matches, stars.starOfRow(row)));
  }
  return seen.flatMap((each, index) => {
    const frame = found.frames[first + index];
    // The register creates no frame without its band.
    return frame?.band ? [newFrame(order, { ...frame, band: frame.band }, each)] : [];
  });
}

interface StarPlace {
  readonly ra: number;
  readonly dec: number;
  readonly standard: number;
}

function placeOfStar(
  order: CheckOrder,
  stars: StarRegister,
  matches: readonly StandardMatch[],
  star: number,
): StarPlace {
  const match = matches[star];
  const standard = match?.kind === 'matched' ? match.standard : -1;
  const ra = stars.ra(star);
  if (!Number.isNaN(ra)) return { ra, dec: stars.dec(star), standard };
  return { ra: order.standards.ra[standard] ?? NaN, dec: order.standards.dec[standard] ?? NaN, standard };
}

function look(order: CheckOrder, { sum, fields }: Seen, { ra, dec, standard }: StarPlace): void {
  if (!Number.isNaN(ra)) {
    const { x, y, z } = directionOf(ra, dec);
    sum.x += x;
    sum.y += y;
    sum.z += z;
  }
  const field = order.standards.fields[standard];
  if (field !== undefined) fields.set(field, (fields.get(field) ?? 0) + 1);
}

type CreatedFrame = RegisteredFrame & { readonly band: NewFrame['band'] };

function newFrame(order: CheckOrder, frame: CreatedFrame, { sum, fields }: Seen): NewFrame {
  const middle = Math.hypot(sum.x, sum.y, sum.z) > 0 ? placeOf(sum) : null;
  const field = [...fields].sort((a, b) => b[1] - a[1])[0]?.[0] ?? null;
  const type = typeOf(order, frame, field);
  const { utcStart, exposure_s } = frame;
  const [ra, dec] = [middle?.ra ?? null, middle?.dec ?? null];
  return {
    number: frame.number,
    file: frame.file,
    type,
    band: frame.band,
    utcStart,
    exposure_s,
    place: { field, ra, decl: dec, ...objectOf(order, type, { field, middle }) },
    geometry: frameGeometry({ site: order.site, ra, dec, utcStart, exposure_s }),
  };
}

function typeOf(order: CheckOrder, frame: CreatedFrame, field: string | null): FrameType {
  if (frame.type !== '') return frame.type;
  if (order.kind !== 'mixed') return order.kind;
  return field === null ? 'target' : 'standard';
}

interface Where {
  readonly field: string | null;
  readonly middle: { readonly ra: number; readonly dec: number } | null;
}

/** What a frame shows, and whose it is: that of the nearest target, unless two programmes look at one place. */
function objectOf(
  order: CheckOrder,
  type: FrameType,
  { field, middle }: Where,
): { readonly object: string; readonly programmeId: number | null } {
  if (type === 'standard') return { object: (field ?? order.name).slice(0, 80), programmeId: null };
  const near = order.targets
    .map((target) => ({ target, distance: middle === null ? Infinity : separation(middle, target) }))
    .filter(({ distance }) => distance <= targetReach)
    .sort((a, b) => a.distance - b.distance);
  const [first] = near;
  const isOnes = new Set(near.map(({ target }) => target.programmeId)).size === 1;
  return {
    object: (first?.target.name ?? order.name).slice(0, 80),
    // Whose frame it is decides who sees it: where it could be two programmes', only a person can say.
    programmeId: first && isOnes && type === 'target' ? first.target.programmeId : null,
  };
}
