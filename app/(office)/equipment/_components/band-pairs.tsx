import type { FormState } from '@/app/_components/ui/action-form';
import { NumberInput } from '@/app/_components/ui/number-input';
import { bands, type Band } from '@/lib/contracts/bands';

interface BandPairsProps {
  readonly state: Pick<FormState<unknown>, 'issue' | 'typed'>;
  readonly legend: string;
  /** Beginning of the field names, before the band's letter: value and error. */
  readonly names: readonly [string, string];
  readonly values: Readonly<Partial<Record<Band, readonly [number, number]>>>;
}

/** A value and its error for each band; a band left empty has none. */
export function BandPairs({ state: { issue, typed }, legend, names, values }: BandPairsProps) {
  return (
    <fieldset>
      <legend className="mb-1 text-small text-ink-2">{legend}</legend>
      <div className="grid gap-1.5">
        {bands.map((band) => {
          const wrong = names.map((name) => issue(`${name}${band}`)).find((text) => text !== undefined);
          return (
            <div key={band}>
              <div className="grid grid-cols-[1.5rem_1fr_auto_1fr] items-center gap-2">
                <span className="font-medium">{band}</span>
                {names.map((name, index) => [
                  index === 1 ? (
                    <span key="sign" aria-hidden="true">
                      ±
                    </span>
                  ) : null,
                  <NumberInput
                    key={name}
                    name={`${name}${band}`}
                    aria-label={index === 0 ? `${band}, value` : `${band}, error`}
                    aria-invalid={issue(`${name}${band}`) === undefined ? undefined : true}
                    defaultValue={typed(`${name}${band}`, values[band]?.[index as 0 | 1].toString() ?? '')}
                  />,
                ])}
              </div>
              {wrong === undefined ? null : (
                <p className="mt-1 text-small font-medium text-bad">
                  <span aria-hidden="true">✕ </span>
                  {band} {wrong}
                </p>
              )}
            </div>
          );
        })}
      </div>
    </fieldset>
  );
}
