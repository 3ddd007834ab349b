const points = ['N', 'NE', 'E', 'SE', 'S', 'SW', 'W', 'NW'] as const;

/** Degrees from north through east as one of eight points of the compass. */
export function compassPoint(degrees: number): string {
  return points[Math.round(degrees / 45) % 8] ?? 'N';
}

/** A direction as people type it: a point of the compass, or degrees; null when it is neither. */
export function readDirection(typed: string): number | null {
  const text = typed.trim().toUpperCase();
  const point = points.findIndex((name) => name === text);
  if (point >= 0) return point * 45;
  return /^\d{1,3}$/.test(text) && Number(text) <= 360 ? Number(text) % 360 : null;
}
