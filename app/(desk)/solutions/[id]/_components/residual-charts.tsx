'use client';

import { useCallback, useMemo } from 'react';
import { useWidth } from '@/app/_components/hooks/use-width';
import { formatCount, formatSigned } from '@/lib/contracts/format-figure';
import type { SolutionObservation } from '@/lib/contracts/api/solution';
import type { Selection } from './observation-list';
import { ResidualChart } from './residual-chart';
import { against, mostPoints, residualAxis, residualPlot, thinned, type Against } from './residual-points';

interface ResidualChartsProps {
  /** Those of the chosen band and night. */
  readonly observations: readonly SolutionObservation[];
  /** What the colour is, where it is one and the same. */
  readonly colourIndex: string | null;
  readonly selection: Selection;
  readonly onSelect: (selection: Selection) => void;
}

const gap = 18;
const narrowest = 320;

/** Residuals against airmass, colour, time and magnitude, on one scale: what is selected in one is ringed in all. */
export function ResidualCharts({ observations, colourIndex, selection, onSelect }: ResidualChartsProps) {
  const [frame, width] = useWidth<HTMLDivElement>();
  const shown = useMemo(() => thinned(observations), [observations]);
  const plots = useMemo(() => {
    const y = residualAxis(shown);
    return against.map((name) => residualPlot(shown, name, y));
  }, [shown]);
  const byId = useMemo(() => new Map(shown.map((one) => [one.observation, one])), [shown]);
  const words = useCallback((id: string) => observationWords(byId.get(id)), [byId]);
  const isWide = width !== null && width >= 2 * narrowest + gap;
  const each = width === null ? null : isWide ? Math.floor((width - gap) / 2) : width;
  const titles: Readonly<Record<Against, string>> = {
    airmass: 'Airmass',
    colour: colourIndex ?? 'Colour',
    utc: 'UTC',
    magnitude: 'Published magnitude',
  };
  const nBeyond = plots[0]?.nBeyond ?? 0;
  return (
    <div ref={frame} className="min-w-0">
      <div
        className="grid gap-y-1.5"
        style={{ columnGap: gap, gridTemplateColumns: isWide ? '1fr 1fr' : '1fr' }}
      >
        {each === null
          ? null
          : plots.map((plot) => (
              <ResidualChart
                key={plot.against}
                plot={plot}
                title={titles[plot.against]}
                width={each}
                selection={selection}
                onSelect={onSelect}
                words={words}
              />
            ))}
      </div>
      {nBeyond === 0 ? null : (
        <p className="mt-1 text-small text-ink-2">
          {formatCount(nBeyond)} {nBeyond === 1 ? 'residual lies' : 'residuals lie'} beyond the scale and{' '}
          {nBeyond === 1 ? 'is' : 'are'} drawn at its end, with an arrow.
        </p>
      )}
      {shown.length === observations.length ? null : (
        <p className="mt-1 text-small text-ink-2">
          {formatCount(shown.length)} of {formatCount(observations.length)} are drawn: at most{' '}
          {formatCount(mostPoints)}, the rejected and the farthest ones among them. The table has all.
        </p>
      )}
    </div>
  );
}

function observationWords(one: SolutionObservation | undefined): string {
  if (one === undefined) return '';
  const { frame, star, band, residual, used } = one;
  return `frame ${frame}, star ${star}, ${band}, residual ${formatSigned(residual, 3)} mag${used ? '' : ', rejected'}`;
}
