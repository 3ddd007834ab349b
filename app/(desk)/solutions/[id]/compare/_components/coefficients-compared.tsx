import { changeInErrors } from '@/app/_components/solutions/coefficient-change';
import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { figureParts, formatFixed, formatSigned, noValue } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Solution, SolutionCoefficient } from '@/lib/contracts/api/solution';
import { bands, type Band } from '@/lib/contracts/bands';
import { coefficientNames, coefficientWords } from '@/lib/contracts/coefficients';

interface Pair {
  readonly one: Solution;
  readonly other: Solution;
}

const coefficientOf = (solution: Solution, band: Band, name: SolutionCoefficient['name']) =>
  solution.bands[band]?.coefficients.find((found) => found.name === name);

/** Coefficients of two solutions side by side, band by band, with the difference in errors. */
export function CoefficientsCompared({ one, other }: Pair) {
  const solved = bands.filter((band) => one.bands[band] !== undefined || other.bands[band] !== undefined);
  return (
    <Panel title="Coefficients" note="difference in the standard errors of the first" flush>
      <DataTable
        caption={`Coefficients of solutions ${one.number} and ${other.number}`}
        head={
          <tr>
            <HeadCell>Band</HeadCell>
            <HeadCell>Coefficient</HeadCell>
            <HeadCell numeric>Solution {one.number}</HeadCell>
            <HeadCell numeric>Solution {other.number}</HeadCell>
            <HeadCell numeric unit="in errors">
              Difference
            </HeadCell>
          </tr>
        }
      >
        {solved.flatMap((band) => [
          ...coefficientNames
            .map((name) => ({
              name,
              first: coefficientOf(one, band, name),
              second: coefficientOf(other, band, name),
            }))
            .filter(({ first, second }) => first !== undefined || second !== undefined)
            .map(({ name, first, second }) => (
              <Row key={`${band} ${name}`}>
                <Cell>{band}</Cell>
                <Cell heading className="whitespace-normal!">
                  {coefficientWords[name].title}
                  <span className="block text-small text-ink-2">{coefficientWords[name].unit}</span>
                </Cell>
                <ValueCell coefficient={first} />
                <ValueCell coefficient={second} />
                <Cell numeric>
                  {first === undefined ? noValue : formatSigned(changeInErrors(first, second), 1)}
                </Cell>
              </Row>
            )),
          ...(['observation', 'frame'] as const).map((part) => (
            <Row key={`${band} ${part}`}>
              <Cell>{band}</Cell>
              <Cell heading className="whitespace-normal!">
                Scatter, {part}
                <span className="block text-small text-ink-2">mag</span>
              </Cell>
              <Cell numeric>{formatFixed(one.bands[band]?.scatter[part], 4)}</Cell>
              <Cell numeric>{formatFixed(other.bands[band]?.scatter[part], 4)}</Cell>
              <Cell />
            </Row>
          )),
        ])}
      </DataTable>
    </Panel>
  );
}

function ValueCell({ coefficient }: { readonly coefficient: SolutionCoefficient | undefined }) {
  if (coefficient === undefined) return <Cell numeric>{noValue}</Cell>;
  const { value, error, status } = coefficient;
  if (value === null) return <Cell className="text-right text-bad">not determined</Cell>;
  const parts = figureParts(value, error, value === 0 ? 0 : 4);
  return (
    <Cell numeric className="whitespace-normal!">
      {parts.value}
      <span className="block text-ink-2">
        {parts.error === null ? null : <span className="whitespace-nowrap">± {parts.error}</span>}{' '}
        {status === 'free' ? null : status}
      </span>
    </Cell>
  );
}
