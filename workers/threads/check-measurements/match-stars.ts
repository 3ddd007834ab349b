import { standardMatcher, type StandardMatch } from '@/lib/photometry/match-standards';
import { frameField, type RegisteredFrame } from './frame-register';
import type { LoadPlan, Slice } from '@/lib/contracts/measurement-check';
import type { CheckOrder } from './messages';
import { newFrames } from './new-frames';
import { numberField, rowFile, textField } from '../row-files';
import type { StarRegister } from './star-register';

type Matched = Pick<LoadPlan, 'stars' | 'matchedRows' | 'newFrames' | 'usedFrames'>;

/** Matches every star of a table, writes the file of its stars and settles what is known of the frames only then. */
export function matchStars(
  order: CheckOrder,
  stars: StarRegister,
  frames: readonly RegisteredFrame[],
): Matched {
  const matches = order.kind === 'target' ? [] : matchAll(order, stars);
  const files: Slice[] = [];
  const file = rowFile(order.folder, 'stars', (slice) => files.push(slice));
  for (let star = 0; star < stars.stars(); star += 1)
    file.write(starLine(order, stars, { star, match: matches[star] }));
  let matchedRows = 0;
  matches.forEach((match, star) => {
    if (match.kind === 'matched') matchedRows += stars.rowsOf(star);
  });
  file.close();
  return {
    stars: files,
    matchedRows,
    newFrames: newFrames(order, stars, { frames, matches }),
    usedFrames: usedFrames(order, stars, frames),
  };
}

function matchAll(order: CheckOrder, stars: StarRegister): StandardMatch[] {
  const match = standardMatcher(order.standards, {
    tolerance: order.tolerance,
    epoch_years: order.night.epoch_years,
  });
  const matches: StandardMatch[] = [];
  for (let star = 0; star < stars.stars(); star += 1) {
    matches.push(match({ key: stars.key(star), ra: stars.ra(star), dec: stars.dec(star) }));
  }
  settleRivals(order, stars, matches);
  return matches;
}

/**
 * Two stars of one frame cannot be one standard: the name counts before the position, then the nearer one; the other is
 * left unmatched with the reason. Stars of different frames may: a position can scatter by more than the tolerance.
 */
function settleRivals(order: CheckOrder, stars: StarRegister, matches: StandardMatch[]): void {
  const holders = new Map<string, number>();
  for (let row = 0; row < stars.rows(); row += 1) {
    const star = stars.starOfRow(row);
    const match = matches[star];
    if (match?.kind !== 'matched') continue;
    const place = `${stars.frameOfRow(row)} ${match.standard}`;
    const rival = holders.get(place);
    const other = rival === undefined ? undefined : matches[rival];
    if (rival === undefined || rival === star || other?.kind !== 'matched') {
      holders.set(place, star);
      continue;
    }
    const wins = isBetter(match, other);
    const name = order.standards.names[match.standard];
    const winner = wins ? match : other;
    const how = winner.by === 'name' ? 'has its name' : `lies nearer, at ${winner.separation.toFixed(1)}″`;
    const reason = `On one frame two stars of the table match ${name}; the other ${how}.`;
    matches[wins ? rival : star] = { kind: 'unmatched', reason };
    if (wins) holders.set(place, star);
  }
}

type Hit = Extract<StandardMatch, { kind: 'matched' }>;
const isBetter = (one: Hit, other: Hit): boolean =>
  one.by === other.by ? one.separation < other.separation : one.by === 'name';

/** star_no, name, ra, decl, n_rows, first_line, standard_id, matched_by, separation, reason */
function starLine(
  order: CheckOrder,
  stars: StarRegister,
  { star, match }: { readonly star: number; readonly match: StandardMatch | undefined },
): string {
  const hit = match?.kind === 'matched' ? match : null;
  const reason = match?.kind === 'unmatched' ? match.reason : (hit?.caution ?? '');
  return [
    star + 1,
    textField(stars.name(star)),
    numberField(stars.ra(star)),
    numberField(stars.dec(star)),
    stars.rowsOf(star),
    stars.firstLine(star),
    hit ? (order.standards.ids[hit.standard] ?? '\\N') : '\\N',
    hit?.by ?? '\\N',
    numberField(hit?.separation ?? NaN),
    textField(reason),
  ].join('\t');
}

function usedFrames(
  order: CheckOrder,
  stars: StarRegister,
  frames: readonly RegisteredFrame[],
): LoadPlan['usedFrames'] {
  const rows = new Map<number, number>();
  for (let row = 0; row < stars.rows(); row += 1) {
    const frame = stars.frameOfRow(row);
    rows.set(frame, (rows.get(frame) ?? 0) + 1);
  }
  return [...rows].map(([index, count]) => ({
    frame: frameField(frames[index]?.id, index, order.frames.length),
    rows: count,
  }));
}
