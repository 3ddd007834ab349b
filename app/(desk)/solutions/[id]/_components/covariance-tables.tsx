import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { formatCount, formatFixed, formatPlain, noValue } from '@/lib/contracts/format-figure';
import { KeyValues } from '@/app/_components/ui/key-values';
import type { SolutionBand } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';
import { coefficientWords } from '@/lib/contracts/coefficients';

interface CovarianceTablesProps {
  readonly band: Band;
  readonly found: SolutionBand;
}

/** How well a band's coefficients are told apart: intervals, inflation, correlation and covariance. */
export function CovarianceTables({ band, found }: CovarianceTablesProps) {
  const titles = found.coefficients.map(({ name }) => coefficientWords[name].title);
  return (
    <section aria-label={`Band ${band}`} className="mb-3">
      <h3 className="px-3.5 pt-2 text-small font-semibold">{band}</h3>
      <DataTable caption={`Intervals in ${band}`} head={<IntervalHead />}>
        {found.coefficients.map(({ name, interval_95, variance_inflation }, index) => (
          <Row key={name}>
            <Cell heading className="whitespace-normal!">
              {titles[index]}
            </Cell>
            <Cell numeric>{interval_95 === null ? noValue : `± ${formatPlain(interval_95, 2)}`}</Cell>
            <Cell numeric>{formatFixed(variance_inflation, 1)}</Cell>
          </Row>
        ))}
      </DataTable>
      <Matrix caption={`Correlation in ${band}`} titles={titles} rows={found.correlation} digits="fixed" />
      <Matrix caption={`Covariance in ${band}`} titles={titles} rows={found.covariance} digits="plain" />
      <div className="px-3.5 pt-2">
        <KeyValues
          items={[
            { key: 'Degrees of freedom', value: formatCount(found.dof), figure: true },
            { key: 'Reduced χ²', value: formatFixed(found.reduced_chi2, 2), figure: true },
            { key: 'Condition number', value: formatPlain(found.condition_number, 3), figure: true },
          ]}
        />
      </div>
    </section>
  );
}

function IntervalHead() {
  return (
    <tr>
      <HeadCell>Coefficient</HeadCell>
      <HeadCell numeric>95 % interval</HeadCell>
      <HeadCell numeric>Variance inflation</HeadCell>
    </tr>
  );
}

interface MatrixProps {
  readonly caption: string;
  readonly titles: readonly string[];
  readonly rows: readonly (readonly (number | null)[])[];
  readonly digits: 'fixed' | 'plain';
}

function Matrix({ caption, titles, rows, digits }: MatrixProps) {
  const written = (value: number | null): string => {
    if (value === null) return noValue;
    // A coefficient that is held has no covariance at all.
    if (value === 0) return '0';
    return digits === 'fixed' ? formatFixed(value, 2) : value.toExponential(1).replaceAll('-', '−');
  };
  return (
    <DataTable
      caption={caption}
      head={
        <tr>
          <HeadCell>{caption.split(' ')[0]}</HeadCell>
          {titles.map((title) => (
            <HeadCell key={title} numeric className="max-w-20 whitespace-normal!">
              {title}
            </HeadCell>
          ))}
        </tr>
      }
    >
      {rows.map((row, index) => (
        <Row key={titles[index]}>
          <Cell heading className="whitespace-normal!">
            {titles[index]}
          </Cell>
          {row.map((value, column) => (
            <Cell key={titles[column]} numeric>
              {written(value)}
            </Cell>
          ))}
        </Row>
      ))}
    </DataTable>
  );
}
