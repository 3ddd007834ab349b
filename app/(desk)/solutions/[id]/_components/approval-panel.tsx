import { Panel } from '@/app/_components/ui/panel';
import type { SolutionPage } from '@/lib/contracts/solution-page';
import { EffectWords } from './effect-words';

/** What happens on approval, and why the reader may not approve, if they may not. */
export function ApprovalPanel({ page: { solution, effect } }: { readonly page: SolutionPage }) {
  if (effect === null) return null;
  const why = solution.may.approve ? '' : solution.may.why_not_approve;
  return (
    <Panel title="If approved">
      <EffectWords effect={effect} />
      {why === '' ? null : <p className="mt-2 text-ink-2">{why}</p>}
    </Panel>
  );
}
