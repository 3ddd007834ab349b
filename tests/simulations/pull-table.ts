import { mean, std } from 'mathjs';
import type { CampaignResult } from './campaign';

/** What the pulls of one quantity may be. */
export interface PullLimits {
  /** Largest mean, either way. [sigma] */
  readonly mean: number;
  readonly smallestSd: number;
  readonly largestSd: number;
}

export interface PullRow {
  readonly name: string;
  readonly n: number;
  readonly mean: number;
  readonly sd: number;
  readonly isMet: boolean;
}

/** Mean and standard deviation of each quantity's pulls, held against the limits; coefficients first, by name. */
export function pullRows({ pulls }: CampaignResult, limits: PullLimits): readonly PullRow[] {
  return [...pulls].map(([name, list]) => {
    const [middle, sd] = [Number(mean([...list])), Number(std([...list]))];
    const isMet = Math.abs(middle) <= limits.mean && sd >= limits.smallestSd && sd <= limits.largestSd;
    return { name, n: list.length, mean: middle, sd, isMet };
  });
}

/** The rows as a table of plain text. */
export function pullTable(title: string, rows: readonly PullRow[], limits: PullLimits): string {
  const signed = (value: number): string => `${value < 0 ? '−' : '+'}${Math.abs(value).toFixed(3)}`;
  const head = `${'quantity'.padEnd(26)}${'n'.padStart(7)}${'mean'.padStart(9)}${'sd'.padStart(9)}   verdict`;
  const lines = rows.map(
    ({ name, n, mean, sd, isMet }) =>
      `${name.padEnd(26)}${String(n).padStart(7)}${signed(mean).padStart(9)}${sd.toFixed(3).padStart(9)}   ${isMet ? 'met' : 'MISSED'}`,
  );
  const asked = `mean within ±${limits.mean}, standard deviation ${limits.smallestSd} to ${limits.largestSd}`;
  return [`${title} (${asked})`, head, ...lines].join('\n');
}
