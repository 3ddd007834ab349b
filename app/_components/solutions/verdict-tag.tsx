import { StateTag } from '@/app/_components/ui/state-tag';
import type { Solution } from '@/lib/contracts/api/solution';
import type { Tone } from '@/app/_components/ui/tone-mark';

const tones: Readonly<Record<NonNullable<Solution['verdict']>, Tone>> = {
  photometric: 'good',
  'usable with care': 'warn',
  'not photometric': 'bad',
};

interface VerdictTagProps {
  readonly solution: Pick<Solution, 'verdict' | 'suggested_verdict'>;
}

/** What a person said of the night; else what the evidence suggests. */
export function VerdictTag({ solution: { verdict, suggested_verdict: suggested } }: VerdictTagProps) {
  if (verdict !== null) return <StateTag state={verdict} tone={tones[verdict]} />;
  return suggested === null ? null : <StateTag state={`suggests ${suggested}`} tone={tones[suggested]} />;
}
