const units = [
  { name: 'day', seconds: 86_400 },
  { name: 'hour', seconds: 3_600 },
  { name: 'minute', seconds: 60 },
  { name: 'second', seconds: 1 },
] as const;

/** A span in words, rounded up in its largest unit: 61 s are “2 minutes”, 90 min are “2 hours”. */
export function durationWords(seconds: number): string {
  const whole = Math.max(1, Math.ceil(seconds));
  const unit = units.find((one) => whole >= one.seconds) ?? units[3];
  const count = Math.ceil(whole / unit.seconds);
  return `${count} ${unit.name}${count === 1 ? '' : 's'}`;
}
