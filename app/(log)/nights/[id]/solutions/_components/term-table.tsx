'use client';

import { NumberInput } from '@/app/_components/ui/number-input';
import { Select } from '@/app/_components/ui/select';
import type { Band } from '@/lib/contracts/bands';
import { coefficientNames, coefficientWords, type ApiCoefficient } from '@/lib/contracts/coefficients';
import type { BandTerms, SolveFaults, TermLine } from './solve-form';

interface TermTableProps {
  readonly band: Band;
  readonly terms: BandTerms;
  readonly faults: SolveFaults;
  readonly onTerm: (name: ApiCoefficient, line: TermLine) => void;
}

const modes = [
  { value: 'free', label: 'free' },
  { value: 'prior', label: 'free, with a value known beforehand' },
  { value: 'fixed', label: 'held at a value' },
  { value: 'none', label: 'left out' },
] as const;

/** How each coefficient of a band enters the fit. */
export function TermTable({ band, terms, faults, onTerm }: TermTableProps) {
  return (
    <fieldset className="min-w-0">
      <legend className="mb-1 font-medium">{band}</legend>
      <div className="grid gap-2">
        {coefficientNames.map((name) => (
          <TermFields
            key={name}
            band={band}
            name={name}
            line={terms[name]}
            fault={faults[`${band} ${name}`]}
            onLine={(line) => onTerm(name, line)}
          />
        ))}
      </div>
    </fieldset>
  );
}

interface TermFieldsProps {
  readonly band: Band;
  readonly name: ApiCoefficient;
  readonly line: TermLine;
  readonly fault: string | undefined;
  readonly onLine: (line: TermLine) => void;
}

function TermFields({ band, name, line, fault, onLine }: TermFieldsProps) {
  const { title, unit } = coefficientWords[name];
  const label = `${title} in ${band}`;
  const { mode, value, error } = line;
  return (
    <div className="grid grid-cols-1 items-center gap-x-3 gap-y-1 sm:grid-cols-[11rem_minmax(0,1fr)]">
      <span className="text-table">
        {title}
        <span className="block text-small text-ink-2">{unit}</span>
      </span>
      <span className="flex flex-wrap items-center gap-2">
        <Select
          aria-label={label}
          value={mode}
          onChange={(event) =>
            onLine({ ...line, mode: modes.find((one) => one.value === event.target.value)?.value ?? 'free' })
          }
          // A band without a zero point is no band.
          choices={name === 'zero_point' ? modes.slice(0, 3) : modes}
          className="min-w-40 grow"
        />
        {mode === 'fixed' || mode === 'prior' ? (
          <NumberInput
            aria-label={`Value of ${label}`}
            aria-invalid={fault !== undefined || undefined}
            value={value}
            onChange={(event) => onLine({ ...line, value: event.target.value })}
            className="w-24!"
          />
        ) : null}
        {mode === 'prior' ? (
          <>
            <span aria-hidden="true">±</span>
            <NumberInput
              aria-label={`Standard error of ${label}`}
              aria-invalid={fault !== undefined || undefined}
              value={error}
              onChange={(event) => onLine({ ...line, error: event.target.value })}
              className="w-24!"
            />
          </>
        ) : null}
        {fault === undefined ? null : (
          <span role="alert" className="basis-full text-small font-medium text-bad">
            ✕ {fault}
          </span>
        )}
      </span>
    </div>
  );
}
