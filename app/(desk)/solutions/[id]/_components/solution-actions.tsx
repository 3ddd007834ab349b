'use client';

import type { Route } from 'next';
import { useState } from 'react';
import { Button } from '@/app/_components/ui/button';
import { LinkButton } from '@/app/_components/ui/link-button';
import type { SolutionPage } from '@/lib/contracts/solution-page';
import { EffectWords } from './effect-words';
import { ModelDialog } from './model-dialog';
import { ApproveDialog, ProposeDialog, WithdrawDialog } from './state-dialogs';

type Shown = 'model' | 'propose' | 'approve' | 'withdraw' | null;

/** What one can do with a solution as it stands. */
export function SolutionActions({ page: { solution, solutions, effect } }: { readonly page: SolutionPage }) {
  const [shown, setShown] = useState<Shown>(null);
  const { may } = solution;
  const close = () => setShown(null);
  return (
    <>
      {solutions.length > 1 ? (
        <LinkButton href={`/solutions/${solution.id}/compare` as Route}>Compare</LinkButton>
      ) : null}
      <Button onClick={() => setShown('model')}>Model</Button>
      {may.withdraw ? <Button onClick={() => setShown('withdraw')}>Withdraw</Button> : null}
      {may.propose ? (
        <Button look="primary" onClick={() => setShown('propose')}>
          Propose for approval
        </Button>
      ) : null}
      {may.approve ? (
        <Button look="primary" onClick={() => setShown('approve')}>
          Approve
        </Button>
      ) : null}
      {shown === 'model' ? <ModelDialog solution={solution} onClose={close} /> : null}
      {shown === 'propose' ? <ProposeDialog solution={solution} onClose={close} /> : null}
      {shown === 'approve' ? (
        <ApproveDialog
          solution={solution}
          onClose={close}
          effect={effect === null ? null : <EffectWords effect={effect} />}
        />
      ) : null}
      {shown === 'withdraw' ? <WithdrawDialog solution={solution} onClose={close} /> : null}
    </>
  );
}
