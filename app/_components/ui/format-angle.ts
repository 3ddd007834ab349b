import { minus, noValue } from './format-figure';

function sexagesimal(total: number, decimals: number): string {
  const scale = 10 ** decimals;
  // Rounded once and as a whole, or 59.97 would show as 60.0.
  const units = Math.round(total * 3600 * scale);
  const seconds = (units % (60 * scale)) / scale;
  const minutes = Math.floor(units / (60 * scale)) % 60;
  const whole = Math.floor(units / (3600 * scale));
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(whole)}:${two(minutes)}:${seconds.toFixed(decimals).padStart(decimals === 0 ? 2 : 3 + decimals, '0')}`;
}

/** Right ascension in degrees as hours, minutes, seconds: `03:53:21.4`. */
export function formatRightAscension(ra: number | null | undefined, decimals = 1): string {
  if (ra === null || ra === undefined || !Number.isFinite(ra)) return noValue;
  const hours = (((ra % 360) + 360) % 360) / 15;
  const text = sexagesimal(hours, decimals);
  return text.startsWith('24') ? sexagesimal(0, decimals) : text;
}

/** Declination in degrees as degrees, minutes, seconds of arc: `−00:01:13`. */
export function formatDeclination(dec: number | null | undefined, decimals = 0): string {
  if (dec === null || dec === undefined || !Number.isFinite(dec)) return noValue;
  return `${dec < 0 ? minus : '+'}${sexagesimal(Math.abs(dec), decimals)}`;
}
