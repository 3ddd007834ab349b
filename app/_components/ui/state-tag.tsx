import { classNames } from './class-names';
import { ToneMark, type Tone } from './tone-mark';

/** States whose word deserves a tone besides; all others are plain. */
const tones: Readonly<Partial<Record<string, Tone>>> = {
  calibrated: 'good',
  approved: 'good',
  'in use': 'good',
  done: 'good',
  matched: 'good',
  photometric: 'good',
  published: 'good',
  refused: 'bad',
  failed: 'bad',
  withdrawn: 'bad',
  reopened: 'warn',
  'not photometric': 'bad',
  'usable with care': 'warn',
};

interface StateTagProps {
  /** The state's word, as people say it. */
  readonly state: string;
  readonly tone?: Tone | 'plain';
}

const looks: Readonly<Record<Tone | 'plain', string>> = {
  plain: 'border-edge',
  good: 'border-good bg-good-wash text-good',
  warn: 'border-warn bg-warn-wash text-warn',
  bad: 'border-bad bg-bad-wash text-bad',
};

export function StateTag({ state, tone = tones[state] ?? 'plain' }: StateTagProps) {
  return (
    <span
      className={classNames(
        'inline-block rounded-tag border px-2 py-px text-small font-medium whitespace-nowrap',
        looks[tone],
      )}
    >
      {tone === 'plain' ? null : (
        <>
          <ToneMark tone={tone} />{' '}
        </>
      )}
      {state}
    </span>
  );
}
