'use client';

import type { Route } from 'next';
import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { callApi } from '@/app/_components/hooks/call-api';
import { useApiCall } from '@/app/_components/hooks/use-api-call';
import { Button } from '@/app/_components/ui/button';
import { Checkbox } from '@/app/_components/ui/checkbox';
import { EmptyState } from '@/app/_components/ui/empty-state';
import { ErrorNotice } from '@/app/_components/ui/error-notice';
import { LinkButton } from '@/app/_components/ui/link-button';
import { Panel } from '@/app/_components/ui/panel';
import { solveNight, type Solution } from '@/lib/contracts/api/solution';
import type { NightSolutionsPage } from '@/lib/contracts/solution-page';
import { SolveFields } from './solve-fields';
import { readSolveForm, solveForm, usualWords, type SolveFaults } from './solve-form';

interface SolvePanelProps {
  readonly night: string;
  readonly page: NightSolutionsPage;
  /** An earlier solution whose options are taken up; null for the usual model. */
  readonly from: Solution | null;
}

/** Starts a solve: one button for the usual model, everything else under a fold. */
export function SolvePanel({ night, page, from }: SolvePanelProps) {
  if (page.bands.length === 0) return <NothingToSolve night={night} />;
  return <Solve key={from?.id ?? ''} night={night} page={page} from={from} />;
}

function NothingToSolve({ night }: { readonly night: string }) {
  return (
    <Panel title="Solve">
      <EmptyState
        title="No matched standards yet"
        action={<LinkButton href={`/nights/${night}/measurements` as Route}>Go to measurements</LinkButton>}
      >
        A solve needs instrumental magnitudes of standard stars: upload a table of them, and let it be
        matched.
      </EmptyState>
    </Panel>
  );
}

function Solve({ night, page, from }: SolvePanelProps) {
  const router = useRouter();
  const available = useMemo(() => page.bands.map(({ band }) => band), [page.bands]);
  const [form, setForm] = useState(() => solveForm(available, from?.model.options ?? null));
  const [faults, setFaults] = useState<SolveFaults>({});
  const [isOpen, setOpen] = useState(from !== null);
  const { isBusy, refusal, run } = useApiCall();
  const solve = async () => {
    const read = readSolveForm(form, available);
    setFaults(read.ok ? {} : read.faults);
    if (!read.ok) return setOpen(true);
    const done = await run(callApi(solveNight, { params: { id: night }, body: read.options }));
    if (done !== null) router.push(`/solutions/${done.value.solution}` as Route);
  };
  const decisions = from?.model.options.exclusions ?? [];
  return (
    <Panel
      title="Solve"
      note={from === null ? 'the usual model' : `with the options of solution ${from.number}`}
    >
      <form
        noValidate
        aria-label="Solve the night"
        className="grid grid-cols-1 gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          void solve();
        }}
      >
        {refusal === null ? null : <ErrorNotice fault={refusal} />}
        <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
          <Button type="submit" look="primary" busy={isBusy} busyLabel="Queueing …">
            Solve
          </Button>
          <Button look="quiet" aria-expanded={isOpen} onClick={() => setOpen(!isOpen)}>
            {isOpen ? 'Hide the options' : 'Other options'}
          </Button>
          <span className="min-w-0 flex-1 basis-80 text-small text-ink-2">{usualWords(available)}</span>
        </div>
        {decisions.length === 0 ? null : (
          <Checkbox
            label={`Keep the ${decisions.length} decisions on observations of that solution`}
            checked={form.exclusions.length > 0}
            onChange={(event) => setForm({ ...form, exclusions: event.target.checked ? decisions : [] })}
          />
        )}
        {isOpen ? <SolveFields page={page} form={form} faults={faults} onForm={setForm} /> : null}
      </form>
    </Panel>
  );
}
