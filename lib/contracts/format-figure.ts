/** Figures as people read them: a true minus sign, no more digits than their uncertainty supports, no negative zero. */

export const minus = '−';
/** Stands where a value is not known. */
export const noValue = '–';

function isNumber(value: number | null | undefined): value is number {
  return typeof value === 'number' && Number.isFinite(value);
}

/** Rounded to a count of decimals, which may be negative: −1 is to tens. */
function roundTo(value: number, decimals: number): string {
  if (decimals >= 0) return value.toFixed(Math.min(decimals, 20));
  const unit = 10 ** -decimals;
  return (Math.round(value / unit) * unit).toFixed(0);
}

function withTrueSign(text: string, signed: boolean): string {
  const isNegative = text.startsWith('-');
  const digits = isNegative ? text.slice(1) : text;
  const isZero = !/[1-9]/.test(digits);
  if (isZero) return digits;
  if (isNegative) return `${minus}${digits}`;
  return signed ? `+${digits}` : digits;
}

/** A figure with so many decimals: `−0.041`. */
export function formatFixed(value: number | null | undefined, decimals: number): string {
  return isNumber(value) ? withTrueSign(roundTo(value, decimals), false) : noValue;
}

/** The same with its sign always shown, for differences: `+0.018`. */
export function formatSigned(value: number | null | undefined, decimals: number): string {
  return isNumber(value) ? withTrueSign(roundTo(value, decimals), true) : noValue;
}

/** A count with thousands apart: `1,184`. */
export function formatCount(value: number | null | undefined): string {
  if (!isNumber(value)) return noValue;
  return withTrueSign(
    Math.round(value)
      .toFixed(0)
      .replace(/\B(?=(\d{3})+$)/g, ','),
    false,
  );
}

/** The figure as it stands, to at most so many significant digits, without zeros that say nothing: `40`, `0.5`. */
export function formatPlain(value: number | null | undefined, significant = 8): string {
  if (!isNumber(value)) return noValue;
  return withTrueSign(String(Number(value.toPrecision(significant))), false);
}

/** Decimals at which a standard error shows two significant digits: 2 for 0.12, 3 for 0.012, −1 for 120. */
export function decimalsSupported(error: number): number {
  const decimalsOf = (size: number) => 1 - Math.floor(Math.log10(size));
  const decimals = decimalsOf(error);
  // 0.0996 rounds up to 0.10, which has one decimal fewer.
  return decimalsOf(Number(roundTo(error, decimals)));
}

export interface FigureParts {
  readonly value: string;
  /** Null when there is no uncertainty to show. */
  readonly error: string | null;
}

/** Value and standard error, both to the decimals that the error supports. */
export function figureParts(
  value: number | null | undefined,
  error: number | null | undefined,
  decimalsWithoutError = 3,
): FigureParts {
  if (!isNumber(value)) return { value: noValue, error: null };
  if (!isNumber(error) || error <= 0) return { value: formatFixed(value, decimalsWithoutError), error: null };
  const decimals = decimalsSupported(error);
  return { value: formatFixed(value, decimals), error: formatFixed(error, decimals) };
}

/** `12.345 ± 0.012`; the value alone when it has no error. */
export function formatWithError(
  value: number | null | undefined,
  error: number | null | undefined,
  decimalsWithoutError = 3,
): string {
  const parts = figureParts(value, error, decimalsWithoutError);
  return parts.error === null ? parts.value : `${parts.value} ± ${parts.error}`;
}

/** A size of a file or a body: `3.4 MB`. */
export function formatBytes(bytes: number): string {
  const units = ['B', 'kB', 'MB', 'GB', 'TB'] as const;
  let size = bytes;
  let unit = 0;
  while (size >= 999.5 && unit < units.length - 1) {
    size /= 1000;
    unit += 1;
  }
  return `${size.toFixed(unit === 0 || size >= 99.95 ? 0 : 1)} ${units[unit] ?? 'B'}`;
}
