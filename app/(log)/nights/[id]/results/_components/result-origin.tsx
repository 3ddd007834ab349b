import type { Route } from 'next';
import Link from 'next/link';
import { buttonClass } from '@/app/_components/ui/button';
import { Finding } from '@/app/_components/ui/finding';
import { formatCount } from '@/lib/contracts/format-figure';
import { formatInstant } from '@/app/_components/ui/format-time';
import { KeyValues, type KeyValue } from '@/app/_components/ui/key-values';
import { Panel } from '@/app/_components/ui/panel';
import { StateTag } from '@/app/_components/ui/state-tag';
import {
  cautionOfNight,
  type CalibratedOrigin,
  type CalibratedPage,
  type CalibratedResult,
} from '@/lib/contracts/calibrated-page';
import { calibratedFlags } from '@/lib/photometry/calibrated-flags';
import { downloadAddress } from './results-address';

interface ResultOriginProps {
  readonly page: CalibratedPage;
  readonly result: CalibratedResult;
}

/** Where the magnitudes come from, what to be careful about, and how to take them along. */
export function ResultOrigin({ page, result }: ResultOriginProps) {
  const { origin } = result;
  const whole = { programme: page.programme, solution: origin.solution };
  return (
    <div className="grid content-start gap-5">
      <Panel title="Download" note={`all ${formatCount(result.nStars)} stars, with provenance`}>
        <p className="flex flex-wrap gap-2">
          <a href={downloadAddress(page.night, whole, 'csv')} download className={buttonClass('primary')}>
            CSV
          </a>
          <a href={downloadAddress(page.night, whole, 'json')} download className={buttonClass()}>
            JSON
          </a>
        </p>
      </Panel>
      <Cautions result={result} />
      <Panel title="Provenance">
        <KeyValues items={originFacts(origin)} />
      </Panel>
    </div>
  );
}

function originFacts(origin: CalibratedOrigin): readonly KeyValue[] {
  return [
    { key: 'Observatory', value: origin.observatory },
    { key: 'Telescope', value: origin.telescope },
    {
      key: 'Solution',
      value: (
        <>
          {origin.number}&ensp;
          <StateTag state={origin.state} />
        </>
      ),
    },
    { key: 'Verdict on the night', value: origin.verdict ?? 'none' },
    {
      key: 'Approved',
      value:
        origin.approvedAt === null
          ? 'not known'
          : `${formatInstant(origin.approvedAt)}${origin.approvedBy === null ? '' : ` by ${origin.approvedBy}`}`,
    },
    ...(origin.calculatedAt === null
      ? []
      : [{ key: 'Calculated', value: formatInstant(origin.calculatedAt) }]),
    { key: 'Standards', value: origin.standardsSource },
    { key: 'Software', value: `Evenfall ${origin.softwareVersion}`, figure: true },
  ];
}

/** A calibrated magnitude is only as good as its solution: what speaks for care is said before the figures are used. */
function Cautions({ result: { origin, cautions, nStars, nClean } }: { readonly result: CalibratedResult }) {
  const ofStars = cautions.filter(({ flag }) => flag !== cautionOfNight);
  return (
    <Panel
      title="Cautions"
      note={`${formatCount(nClean)} of ${formatCount(nStars)} stars have none of their own`}
    >
      <div className="grid gap-2">
        {origin.state === 'superseded' ? (
          <Finding tone="warn">
            A later solution has superseded this one. Its magnitudes stay as they were, for whoever has used
            them.
          </Finding>
        ) : null}
        {origin.verdict === 'not photometric' ? (
          <Finding tone="bad" word="Not photometric">
            The night was judged not photometric: its magnitudes can be wrong by more than their errors say.
          </Finding>
        ) : null}
        {origin.verdict === 'usable with care' ? (
          <Finding tone="warn">
            The night was judged usable with care: see what its solution says before you trust the errors.
          </Finding>
        ) : null}
        {ofStars.length === 0 ? (
          <Finding tone="good" word="No star is flagged">
            Colours, airmasses and times lie within what the standards covered.
          </Finding>
        ) : (
          <ul className="grid gap-1 text-table">
            {ofStars.map(({ flag, nStars: n }) => (
              <li key={flag} className="flex justify-between gap-3">
                <span>{calibratedFlags[flag].words}</span>
                <span className="font-mono whitespace-nowrap">{formatCount(n)}</span>
              </li>
            ))}
          </ul>
        )}
        <p className="text-small text-ink-2">
          A magnitude is only as good as its solution.{' '}
          <Link href={`/solutions/${origin.solution}` as Route}>See solution {origin.number}</Link> for its
          coefficients, its residuals and what was left out.
        </p>
      </div>
    </Panel>
  );
}
