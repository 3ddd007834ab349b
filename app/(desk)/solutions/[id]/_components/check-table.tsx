import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatFixed, noValue } from '@/lib/contracts/format-figure';
import { formatMinutes } from '@/app/_components/ui/format-time';
import type { SolutionBand } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';

export interface Solved {
  readonly band: Band;
  readonly found: SolutionBand;
}

/** `19:24 to 05:12` */
export const utcWords = (utc: SolutionBand['utc']): string | null =>
  utc === null ? null : `${formatMinutes(utc.first)} to ${formatMinutes(utc.last)}`;

/** What no sentence of the evidence says, where there are too many bands for lines of their own. */
export function CheckTable({ solved }: { readonly solved: readonly Solved[] }) {
  return (
    <DataTable
      caption="Checks of the fit"
      className="border-t border-rule"
      head={
        <tr>
          <HeadCell>Band</HeadCell>
          <HeadCell numeric unit="UTC">
            Time covered
          </HeadCell>
          <HeadCell numeric unit="in their errors">
            Runs of signs
          </HeadCell>
          <HeadCell numeric unit="mag" className="whitespace-normal!">
            Leave one star out
          </HeadCell>
        </tr>
      }
    >
      {solved.map(({ band, found: { utc, runs, leave_one_star_out } }) => (
        <Row key={band}>
          <Cell heading>{band}</Cell>
          <Cell numeric>{utcWords(utc) ?? noValue}</Cell>
          <Cell numeric>{formatFixed(runs, 1)}</Cell>
          <Cell numeric>{formatFixed(leave_one_star_out, 3)}</Cell>
        </Row>
      ))}
    </DataTable>
  );
}
