import type { ReactNode } from 'react';
import { classNames } from './class-names';
import { ToneMark, toneText, type Tone } from './tone-mark';

const looks: Readonly<Record<Tone, string>> = {
  good: 'border-good bg-good-wash border-solid',
  warn: 'border-warn bg-warn-wash border-dashed',
  bad: 'border-bad bg-bad-wash border-double border-l-6',
};
const words: Readonly<Record<Tone, string>> = { good: 'Good', warn: 'Take care', bad: 'Fault' };

interface FindingProps {
  readonly tone: Tone;
  /** The word that stands for the tone. */
  readonly word?: string;
  readonly children: ReactNode;
  readonly className?: string;
}

/** One thing found: its tone by word, shape and edge, and only then by colour. */
export function Finding({ tone, word = words[tone], children, className }: FindingProps) {
  return (
    <div
      className={classNames(
        'flex gap-2 rounded-r-control border-l-3 px-3 py-2 text-table text-ink',
        looks[tone],
        className,
      )}
    >
      <span className={classNames('shrink-0 font-semibold whitespace-nowrap', toneText[tone])}>
        <ToneMark tone={tone} /> {word}
      </span>
      <div className="min-w-0">{children}</div>
    </div>
  );
}
