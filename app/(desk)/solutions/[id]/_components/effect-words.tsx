import { formatCount } from '@/lib/contracts/format-figure';
import type { ApprovalEffect } from '@/lib/contracts/solution-page';

const many = (count: number, noun: string): string =>
  `${formatCount(count)} ${noun}${count === 1 ? '' : 's'}`;

function transformed({ isPhotometric, nMagnitudes, nProgrammes }: ApprovalEffect): string {
  if (!isPhotometric) return 'The night is called not photometric, so nothing is transformed';
  if (nMagnitudes === 0) return 'No target has been measured yet, so nothing is transformed';
  const verb = nMagnitudes === 1 ? 'is' : 'are';
  return `${many(nMagnitudes, 'magnitude')} of ${many(nProgrammes, 'programme')} ${verb} transformed`;
}

/** What an approval sets off, in two sentences. */
export function EffectWords({ effect }: { readonly effect: ApprovalEffect }) {
  const { nInvestigators, supersedes } = effect;
  const mail =
    nInvestigators === 0
      ? 'nobody gets mail'
      : `${many(nInvestigators, 'investigator')} ${nInvestigators === 1 ? 'gets' : 'get'} mail`;
  return (
    <p>
      {transformed(effect)}; {mail}; the night becomes calibrated.
      {supersedes === null
        ? null
        : ` Solution ${supersedes}, approved until now, is superseded; its values stay readable.`}
    </p>
  );
}
