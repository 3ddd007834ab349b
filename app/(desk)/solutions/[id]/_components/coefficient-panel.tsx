import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { figureParts, formatFixed, formatSigned, formatWithError } from '@/lib/contracts/format-figure';
import { Panel } from '@/app/_components/ui/panel';
import type { Solution, SolutionBand, SolutionCoefficient } from '@/lib/contracts/api/solution';
import { bands, type Band } from '@/lib/contracts/bands';
import { coefficientNames, coefficientWords, type ApiCoefficient } from '@/lib/contracts/coefficients';
import { changeInErrors } from '@/app/_components/solutions/coefficient-change';
import { CovarianceTables } from './covariance-tables';
import { FoldOut } from './fold-out';

interface CoefficientPanelProps {
  readonly title: string;
  readonly found: Solution['bands'];
  /** What changes are counted from. */
  readonly before: { readonly number: number; readonly found: Solution['bands'] } | null;
}

type Solved = readonly { readonly band: Band; readonly found: SolutionBand }[];

const coefficientOf = (found: SolutionBand | undefined, name: ApiCoefficient) =>
  found?.coefficients.find((one) => one.name === name);

/** Coefficients by band with their errors, how each entered, and how far it moved since the solution before. */
export function CoefficientPanel({ title, found, before }: CoefficientPanelProps) {
  const solved: Solved = bands.flatMap((band) => {
    const one = found[band];
    return one === undefined ? [] : [{ band, found: one }];
  });
  const names = coefficientNames.filter((name) =>
    solved.some((one) => coefficientOf(one.found, name) !== undefined),
  );
  return (
    <Panel
      title={title}
      note={`± standard error${before === null ? '' : `; change from solution ${before.number} in errors`}`}
      flush
    >
      <DataTable caption={title} head={<Head solved={solved} />}>
        {names.map((name) => (
          <Row key={name} className="align-top">
            <Cell heading className="whitespace-normal!">
              {coefficientWords[name].title}
              <span className="block text-small text-ink-2">{coefficientWords[name].unit}</span>
            </Cell>
            {solved.map((one) => (
              <CoefficientCell
                key={one.band}
                coefficient={coefficientOf(one.found, name)}
                before={coefficientOf(before?.found[one.band], name)}
              />
            ))}
          </Row>
        ))}
        <ScatterRow title="Scatter, observation" solved={solved} part="observation" />
        <ScatterRow title="Scatter, frame" solved={solved} part="frame" />
      </DataTable>
      <FoldOut label="Intervals, correlation, covariance">
        {solved.map((one) => (
          <CovarianceTables key={one.band} {...one} />
        ))}
      </FoldOut>
    </Panel>
  );
}

function Head({ solved }: { readonly solved: Solved }) {
  return (
    <tr>
      <HeadCell>
        <span className="sr-only">Coefficient</span>
      </HeadCell>
      {solved.map(({ band }) => (
        <HeadCell key={band} numeric>
          {band}
        </HeadCell>
      ))}
    </tr>
  );
}

interface CoefficientCellProps {
  readonly coefficient: SolutionCoefficient | undefined;
  readonly before: SolutionCoefficient | undefined;
}

function CoefficientCell({ coefficient, before }: CoefficientCellProps) {
  if (coefficient === undefined) return <Cell numeric>–</Cell>;
  const { value, error, status, prior } = coefficient;
  if (value === null) return <Cell className="text-right text-bad">not determined</Cell>;
  if (status === 'fixed') {
    return (
      <Cell numeric>
        {formatFixed(value, value === 0 ? 0 : 4)}
        <span className="block text-ink-2">fixed</span>
      </Cell>
    );
  }
  const parts = figureParts(value, error, 4);
  const change = changeInErrors(coefficient, before);
  return (
    <Cell numeric className="whitespace-normal!">
      {parts.value}
      <span className="block text-ink-2">
        {parts.error === null ? null : <span className="whitespace-nowrap">± {parts.error}</span>}{' '}
        {change === null ? null : (
          <span className="ml-2 whitespace-nowrap">
            <span className="sr-only">change </span>
            {formatSigned(change, 1)}
          </span>
        )}
      </span>
      {status === 'prior' && prior !== null ? (
        <span className="block text-ink-2">
          prior <span className="whitespace-nowrap">{formatWithError(prior.value, prior.error)}</span>
        </span>
      ) : null}
    </Cell>
  );
}

interface ScatterRowProps {
  readonly title: string;
  readonly solved: Solved;
  readonly part: 'observation' | 'frame';
}

function ScatterRow({ title, solved, part }: ScatterRowProps) {
  return (
    <Row>
      <Cell heading>{title}</Cell>
      {solved.map(({ band, found }) => (
        <Cell key={band} numeric>
          {formatFixed(found.scatter[part], 4)}
        </Cell>
      ))}
    </Row>
  );
}
