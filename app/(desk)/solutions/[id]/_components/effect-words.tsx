import { formatCount } from '@/app/_components/ui/format-figure';
import type { ApprovalEffect } from '@/lib/contracts/solution-page';

const many = (count: number, noun: string): string =>
  `${formatCount(count)} ${noun}${count === 1 ? '' : 's'}`;

/** What an approval sets off, in two sentences. */
export function EffectWords({ effect }: { readonly effect: ApprovalEffect }) {
  const { nMagnitudes, nProgrammes, nInvestigators, supersedes } = effect;
  const mail =
    nInvestigators === 0
      ? 'nobody gets mail'
      : `${many(nInvestigators, 'investigator')} ${nInvestigators === 1 ? 'gets' : 'get'} mail`;
  return (
    <p>
      {nMagnitudes === 0
        ? 'No target has been measured yet, so nothing is transformed'
        : `${many(nMagnitudes, 'magnitude')} of ${many(nProgrammes, 'programme')} ${nMagnitudes === 1 ? 'is' : 'are'} transformed`}
      ; {mail}; the night becomes calibrated.
      {supersedes === null
        ? null
        : ` Solution ${supersedes}, approved until now, is superseded; its values stay readable.`}
    </p>
  );
}
