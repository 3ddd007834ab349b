import { indexWords } from '@/app/_components/solutions/solution-words';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Figure } from '@/app/_components/ui/figure';
import { formatFixed, noValue } from '@/app/_components/ui/format-figure';
import { formatMinutes } from '@/app/_components/ui/format-time';
import type { SolutionBand } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';

export interface Solved {
  readonly band: Band;
  readonly found: SolutionBand;
}

/** `1.04 to 2.11` */
export const rangeWords = (range: SolutionBand['airmass']): string | null =>
  range === null ? null : `${formatFixed(range.min, 2)} to ${formatFixed(range.max, 2)}`;

/** `19:24 to 05:12` */
export const utcWords = (utc: SolutionBand['utc']): string | null =>
  utc === null ? null : `${formatMinutes(utc.first)} to ${formatMinutes(utc.last)}`;

/** What the standards covered and how the fit was checked, where there are too many bands for lines of their own. */
export function CoverageTables({ solved }: { readonly solved: readonly Solved[] }) {
  return (
    <>
      <DataTable
        caption="What the standards covered"
        className="border-t border-rule"
        head={
          <tr>
            <HeadCell>Band</HeadCell>
            <HeadCell numeric>Airmass</HeadCell>
            <HeadCell numeric>Colour</HeadCell>
            <HeadCell numeric>UTC</HeadCell>
          </tr>
        }
      >
        {solved.map(({ band, found: { airmass, colour, colour_index, utc } }) => (
          <Row key={band} className="align-top">
            <Cell heading>{band}</Cell>
            <Cell numeric>{rangeWords(airmass) ?? noValue}</Cell>
            <Cell numeric>
              {rangeWords(colour) ?? noValue}
              <span className="block text-small text-ink-2">{indexWords(colour_index)}</span>
            </Cell>
            <Cell numeric>{utcWords(utc) ?? noValue}</Cell>
          </Row>
        ))}
      </DataTable>
      <DataTable
        caption="Checks of the fit"
        head={
          <tr>
            <HeadCell>Band</HeadCell>
            <HeadCell numeric unit="mag per hour">
              Drift
            </HeadCell>
            <HeadCell numeric unit="in their errors">
              Runs of signs
            </HeadCell>
            <HeadCell numeric unit="mag">
              Leave one star out
            </HeadCell>
          </tr>
        }
      >
        {solved.map(({ band, found: { drift, runs, leave_one_star_out } }) => (
          <Row key={band}>
            <Cell heading>{band}</Cell>
            <Cell numeric>
              <Figure value={drift?.value ?? null} error={drift?.error ?? null} decimals={4} />
            </Cell>
            <Cell numeric>{formatFixed(runs, 1)}</Cell>
            <Cell numeric>{formatFixed(leave_one_star_out, 3)}</Cell>
          </Row>
        ))}
      </DataTable>
    </>
  );
}
