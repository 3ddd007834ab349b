'use client';

import { airmassWords } from '@/app/_components/solutions/solution-words';
import { BandMark } from '@/app/_components/ui/band-mark';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { Field } from '@/app/_components/ui/field';
import { formatCount } from '@/lib/contracts/format-figure';
import { formatDateInWords } from '@/app/_components/ui/format-time';
import { Select } from '@/app/_components/ui/select';
import type { NightSolutionsPage } from '@/lib/contracts/solution-page';
import { AirmassFormula } from '@/lib/contracts/solve-options';
import type { SolveFaults, SolveForm } from './solve-form';
import { TermTable } from './term-table';

interface SolveFieldsProps {
  readonly page: NightSolutionsPage;
  readonly form: SolveForm;
  readonly faults: SolveFaults;
  readonly onForm: (form: SolveForm) => void;
}

const withOrWithout = <T,>(values: readonly T[], value: T, isIn: boolean): readonly T[] =>
  isIn ? [...values, value] : values.filter((one) => one !== value);

/** Everything that a solve can be told. All of it is filled in as the usual model has it. */
export function SolveFields({ page: { bands, nights }, form, faults, onForm }: SolveFieldsProps) {
  return (
    <div className="grid grid-cols-1 gap-5">
      <fieldset>
        <legend className="mb-1 text-small text-ink-2">Bands</legend>
        <div className="flex flex-wrap gap-x-6 gap-y-1">
          {bands.map(({ band, nObservations, nStars, nFrames }) => (
            <Checkbox
              key={band}
              label={
                <>
                  <BandMark band={band} /> {band}
                </>
              }
              hint={`${formatCount(nObservations)} observations of ${formatCount(nStars)} standards on ${formatCount(nFrames)} frames`}
              checked={form.bands.includes(band)}
              onChange={(event) =>
                onForm({ ...form, bands: withOrWithout(form.bands, band, event.target.checked) })
              }
            />
          ))}
        </div>
        {faults.bands === undefined ? null : (
          <p role="alert" className="text-small font-medium text-bad">
            ✕ {faults.bands}
          </p>
        )}
      </fieldset>
      <div className="grid grid-cols-1 gap-6 lg:grid-cols-2">
        {bands
          .filter(({ band }) => form.bands.includes(band))
          .map(({ band }) => (
            <TermTable
              key={band}
              band={band}
              terms={form.terms[band]}
              faults={faults}
              onTerm={(name, line) =>
                onForm({ ...form, terms: { ...form.terms, [band]: { ...form.terms[band], [name]: line } } })
              }
            />
          ))}
      </div>
      <Field
        label="Airmass after"
        hint="Young 1994 holds down to the horizon; the others are for comparison with older work."
        className="max-w-sm"
      >
        {(control) => (
          <Select
            {...control}
            value={form.airmass_formula}
            onChange={(event) =>
              onForm({ ...form, airmass_formula: AirmassFormula.parse(event.target.value) })
            }
            choices={AirmassFormula.options.map((value) => ({ value, label: airmassWords[value] }))}
          />
        )}
      </Field>
      {nights.length === 0 ? null : (
        <FurtherNights
          nights={nights}
          chosen={form.nights}
          onChosen={(chosen) => onForm({ ...form, nights: chosen })}
        />
      )}
    </div>
  );
}

interface FurtherNightsProps {
  readonly nights: NightSolutionsPage['nights'];
  readonly chosen: readonly string[];
  readonly onChosen: (chosen: readonly string[]) => void;
}

function FurtherNights({ nights, chosen, onChosen }: FurtherNightsProps) {
  return (
    <fieldset>
      <legend className="mb-1 text-small text-ink-2">
        Further nights, solved jointly: each has its own zero point and extinction, all share the colour terms
      </legend>
      <div className="grid max-h-60 gap-1 overflow-auto sm:grid-cols-2">
        {nights.map(({ id, date, nObservations }) => (
          <Checkbox
            key={id}
            label={formatDateInWords(date)}
            hint={`${formatCount(nObservations)} observations`}
            checked={chosen.includes(id)}
            onChange={(event) => onChosen(withOrWithout(chosen, id, event.target.checked))}
          />
        ))}
      </div>
    </fieldset>
  );
}
