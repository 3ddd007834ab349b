'use client';

import { Checkbox } from '@/app/_components/ui/checkbox';
import { NumberInput } from '@/app/_components/ui/number-input';
import { TextInput } from '@/app/_components/ui/text-input';
import { bands, type Band } from '@/lib/contracts/bands';
import { setFiltersAction } from '../actions';
import { EditDialog } from './edit-dialog';

interface FiltersDialogProps {
  readonly telescope: string;
  readonly filters: readonly {
    readonly band: Band;
    readonly name: string;
    readonly defaultExposure: number | null;
  }[];
}

export function FiltersDialog({ telescope, filters }: FiltersDialogProps) {
  return (
    <EditDialog
      action={setFiltersAction}
      title="Filters"
      button="Change"
      buttonLabel={`Change the filters of ${telescope}`}
      hidden={{ telescope }}
      fields={bands.flatMap((band) => [`name${band}`, `exposure${band}`])}
    >
      {({ issue, typed }) => (
        <div className="grid gap-2">
          {bands.map((band) => {
            const filter = filters.find((one) => one.band === band);
            const wrong = issue(`exposure${band}`) ?? issue(`name${band}`);
            return (
              <div key={band}>
                <div className="grid grid-cols-[4rem_1fr_6rem] items-center gap-2">
                  <Checkbox name={`has${band}`} label={band} defaultChecked={filter !== undefined} />
                  <TextInput
                    name={`name${band}`}
                    aria-label={`Filter for ${band}`}
                    placeholder="name of the filter"
                    defaultValue={typed(`name${band}`, filter?.name ?? '')}
                  />
                  <NumberInput
                    name={`exposure${band}`}
                    aria-label={`Usual exposure in ${band}, s`}
                    placeholder="s"
                    defaultValue={typed(`exposure${band}`, filter?.defaultExposure?.toString() ?? '')}
                  />
                </div>
                {wrong === undefined ? null : (
                  <p className="mt-1 text-small font-medium text-bad">
                    ✕ {band} {wrong}
                  </p>
                )}
              </div>
            );
          })}
          <p className="text-small text-ink-2">
            Band, filter, usual exposure in seconds: what the log offers first. A band with frames stays.
          </p>
        </div>
      )}
    </EditDialog>
  );
}
