import { ConditionInput, type Condition } from '@/lib/contracts/api/condition';
import { instantInNight, type NightSpan } from '@/lib/contracts/night-clock';
import { readFigure } from './frame-line';
import { compassPoint, readDirection } from './wind-words';

/** A conditions entry as it is typed. */
export interface ConditionLine {
  readonly utc: string;
  readonly cloud: string;
  readonly seeing: string;
  readonly humidity: string;
  readonly wind: string;
  readonly wind_direction: string;
  readonly temperature: string;
  readonly sky_brightness: string;
  readonly comment: string;
}
export type ConditionField = keyof ConditionLine;
export type ConditionFaults = Readonly<Partial<Record<ConditionField | 'entry', string>>>;

export const blankCondition: ConditionLine = {
  utc: '',
  cloud: '',
  seeing: '',
  humidity: '',
  wind: '',
  wind_direction: '',
  temperature: '',
  sky_brightness: '',
  comment: '',
};

const text = (value: number | null) => (value === null ? '' : String(value));

export function conditionLineOf(entry: Condition): ConditionLine {
  return {
    utc: entry.utc.slice(11, 19),
    cloud: text(entry.cloud),
    seeing: text(entry.seeing),
    humidity: text(entry.humidity),
    wind: text(entry.wind),
    wind_direction: entry.wind_direction === null ? '' : directionText(entry.wind_direction),
    temperature: text(entry.temperature),
    sky_brightness: text(entry.sky_brightness),
    comment: entry.comment,
  };
}

function directionText(degrees: number): string {
  const point = compassPoint(degrees);
  return readDirection(point) === degrees ? point : String(degrees);
}

const figures = ['cloud', 'seeing', 'humidity', 'wind', 'temperature', 'sky_brightness'] as const;

export type ReadCondition =
  | { readonly ok: true; readonly input: ConditionInput }
  | { readonly ok: false; readonly faults: ConditionFaults };

/** The entry that a line says, or what is wrong, field by field. What is empty was not looked at, and is said so. */
export function readCondition(line: ConditionLine, night: NightSpan): ReadCondition {
  const faults: Partial<Record<ConditionField | 'entry', string>> = {};
  const at = instantInNight(line.utc, night);
  if (!at.ok) faults.utc = at.reason;
  const values: Record<string, number | null> = {};
  for (const field of figures) {
    const value = line[field].trim() === '' ? null : readFigure(line[field]);
    if (value === null && line[field].trim() !== '') faults[field] = 'is not a number: write 1.4';
    values[field] = value;
  }
  const direction = line.wind_direction.trim() === '' ? null : readDirection(line.wind_direction);
  if (direction === null && line.wind_direction.trim() !== '') {
    faults.wind_direction = 'is neither N, NE … NW nor degrees';
  }
  if (Object.keys(faults).length > 0) return { ok: false, faults };
  const parsed = ConditionInput.safeParse({
    utc: at.ok ? at.utc : '',
    ...values,
    wind_direction: direction,
    comment: line.comment,
  });
  if (parsed.success) return { ok: true, input: parsed.data };
  for (const { path, message } of parsed.error.issues) {
    const field = String(path[0] ?? 'entry');
    faults[field in blankCondition ? (field as ConditionField) : 'entry'] ??= message;
  }
  return { ok: false, faults };
}
