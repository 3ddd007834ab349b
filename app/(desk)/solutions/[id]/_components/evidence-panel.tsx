import { indexWords } from '@/app/_components/solutions/solution-words';
import { Finding } from '@/app/_components/ui/finding';
import { formatFixed, formatWithError, noValue } from '@/lib/contracts/format-figure';
import { KeyValues, type KeyValue } from '@/app/_components/ui/key-values';
import { Panel } from '@/app/_components/ui/panel';
import type { Tone } from '@/app/_components/ui/tone-mark';
import type { Solution, SolutionBand } from '@/lib/contracts/api/solution';
import { bands } from '@/lib/contracts/bands';
import { CrossChecks } from './cross-checks';
import { CheckTable, utcWords, type Solved } from './check-table';
import { FoldOut } from './fold-out';

type Speaks = Solution['evidence'][number]['speaks'];
const tones: Readonly<Record<Speaks, Tone>> = { for: 'good', care: 'warn', against: 'bad' };
const words: Readonly<Record<Speaks, string>> = { for: 'For', care: 'Take care', against: 'Against' };

/** What speaks for the night and what against it, what the standards covered, and the checks beside the fit. */
export function EvidencePanel({ solution }: { readonly solution: Solution }) {
  const solved = bands.flatMap((band) => {
    const found = solution.bands[band];
    return found === undefined ? [] : [{ band, found }];
  });
  return (
    <Panel title="Evidence on the night" flush>
      <div className="grid gap-2.5 px-3.5 py-3">
        {grouped(solution.evidence).map(({ speaks, kind, sentences }) => (
          <Finding key={`${speaks} ${kind}`} tone={tones[speaks]} word={words[speaks]}>
            {sentences.map((sentence) => (
              <p key={sentence}>{sentence}</p>
            ))}
          </Finding>
        ))}
        {solved.length > 2 ? null : <KeyValues items={coverage(solved)} />}
      </div>
      {solved.length > 2 ? <CheckTable solved={solved} /> : null}
      {solved.length === 0 ? null : (
        <FoldOut label="Cross-checks: lines of single stars, pairs of stars">
          {solved.map((one) => (
            <CrossChecks key={one.band} {...one} />
          ))}
        </FoldOut>
      )}
    </Panel>
  );
}

interface Group {
  readonly speaks: Speaks;
  readonly kind: string;
  readonly sentences: readonly string[];
}

/** What is alike in several bands stands together, and what speaks against the night before what speaks for it. */
function grouped(evidence: Solution['evidence']): readonly Group[] {
  const groups = new Map<string, Group>();
  for (const { speaks, kind, words: sentence } of evidence) {
    const key = `${speaks} ${kind}`;
    const sentences = [...(groups.get(key)?.sentences ?? []), sentence];
    groups.set(key, { speaks, kind, sentences });
  }
  const order = ['against', 'care', 'for'] as const;
  return [...groups.values()].sort((one, other) => order.indexOf(one.speaks) - order.indexOf(other.speaks));
}

/** The same in all bands stands once, else band by band. */
function rowsOf(
  key: string,
  solved: readonly Solved[],
  written: (found: SolutionBand) => string | null,
): readonly KeyValue[] {
  const values = solved.flatMap(({ band, found }) => {
    const value = written(found);
    return value === null ? [] : [{ band, value }];
  });
  const [first] = values;
  if (first === undefined) return [];
  if (values.every(({ value }) => value === first.value)) return [{ key, value: first.value, figure: true }];
  return values.map(({ band, value }) => ({ key: `${key}, ${band}`, value, figure: true }));
}

/** `1.04 to 2.11` */
const rangeWords = (range: SolutionBand['airmass']): string | null =>
  range === null ? null : `${formatFixed(range.min, 2)} to ${formatFixed(range.max, 2)}`;

function coverage(solved: readonly Solved[]): readonly KeyValue[] {
  return [
    ...rowsOf('Airmass covered', solved, ({ airmass }) => rangeWords(airmass)),
    ...rowsOf('Colour covered', solved, ({ colour, colour_index }) =>
      colour === null ? null : `${indexWords(colour_index)} ${rangeWords(colour) ?? noValue}`,
    ),
    ...rowsOf('Time covered, UTC', solved, ({ utc }) => utcWords(utc)),
    ...rowsOf('Drift, mag per hour', solved, ({ drift }) =>
      drift === null ? null : formatWithError(drift.value, drift.error, 4),
    ),
    ...rowsOf('Runs of signs, in their errors', solved, ({ runs }) =>
      runs === null ? null : formatFixed(runs, 1),
    ),
    ...rowsOf('Leave one star out, mag', solved, ({ leave_one_star_out: left }) =>
      left === null ? null : formatFixed(left, 3),
    ),
  ];
}
