'use client';

import type { Route } from 'next';
import { Dialog } from '@/app/_components/ui/dialog';
import { formatWithError } from '@/lib/contracts/format-figure';
import { formatDateInWords, formatInstant } from '@/app/_components/ui/format-time';
import { KeyValues } from '@/app/_components/ui/key-values';
import { LinkButton } from '@/app/_components/ui/link-button';
import { airmassWords, listWords } from '@/app/_components/solutions/solution-words';
import type { Solution } from '@/lib/contracts/api/solution';
import { bands } from '@/lib/contracts/bands';
import { coefficientNames, coefficientWords } from '@/lib/contracts/coefficients';

interface ModelDialogProps {
  readonly solution: Solution;
  readonly onClose: () => void;
}

/** What differs from the usual model, a sentence each. */
function changesOf({ model: { options } }: Solution): readonly string[] {
  return bands.flatMap((band) =>
    coefficientNames.flatMap((name) => {
      const where = `${coefficientWords[name].title} in ${band}`;
      const term = options.terms[band]?.[name];
      const prior = options.priors[band]?.[name];
      if (prior !== undefined) {
        return [`${where}: free, with ${formatWithError(prior.value, prior.error)} known beforehand`];
      }
      if (term === undefined) return [];
      if (term === 'free') return [`${where}: free`];
      return [term === 'none' ? `${where}: left out` : `${where}: held at ${term.fixed}`];
    }),
  );
}

/** How the solution was asked for, and of what it was made. */
export function ModelDialog({ solution, onClose }: ModelDialogProps) {
  const { model, inputs, joint_nights: nights, software_version, created_by, created_at } = solution;
  const changes = changesOf(solution);
  const decisions = model.options.exclusions.length;
  return (
    <Dialog
      open
      wide
      onClose={onClose}
      closeLabel="Close"
      title={`Model of solution ${solution.number}`}
      actions={
        solution.may.solve_again ? (
          <LinkButton href={`/nights/${solution.night}/solutions?from=${solution.id}` as Route}>
            Solve with other options
          </LinkButton>
        ) : null
      }
    >
      <div className="grid gap-4">
        <p className="font-mono text-table wrap-anywhere">
          m = M + Z + k′·X + T·C + k″·X·C [+ τ·t] [+ κ·t·X] [+ T₂·C²] + star + frame
        </p>
        {changes.length === 0 ? (
          <p>The usual terms in every band.</p>
        ) : (
          <div>
            <p>The usual terms, but</p>
            <ul className="list-disc pl-5">
              {changes.map((change) => (
                <li key={change}>{change}</li>
              ))}
            </ul>
          </div>
        )}
        <KeyValues
          items={[
            { key: 'Airmass', value: `after ${airmassWords[model.airmass_formula]}` },
            {
              key: 'Further nights',
              value:
                nights.length === 0 ? 'none' : listWords(nights.map(({ date }) => formatDateInWords(date))),
            },
            {
              key: 'Decisions on observations',
              value: decisions === 0 ? 'none' : `${decisions}, each with its reason`,
            },
            { key: 'Standards', value: inputs.standards_source },
            { key: 'Equipment epoch', value: inputs.equipment_epoch ?? 'none recorded' },
            ...inputs.sets.map(({ id, name, sha256 }) => ({
              key: `Set ${name}`,
              value: <span title={id}>SHA-256 {sha256}</span>,
              figure: true,
            })),
            {
              key: 'Observations as fitted',
              value: inputs.hash === null ? '–' : `SHA-256 ${inputs.hash}`,
              figure: true,
            },
            { key: 'Software', value: software_version, figure: true },
            { key: 'Asked for', value: `by ${created_by}, ${formatInstant(created_at)}` },
          ]}
        />
      </div>
    </Dialog>
  );
}
