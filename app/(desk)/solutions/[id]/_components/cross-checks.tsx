import { Cell, DataTable, HeadCell, Row } from '@/app/_components/ui/data-table';
import { Figure } from '@/app/_components/ui/figure';
import { formatCount } from '@/lib/contracts/format-figure';
import type { SolutionBand } from '@/lib/contracts/api/solution';
import type { Band } from '@/lib/contracts/bands';

interface CrossChecksProps {
  readonly band: Band;
  readonly found: SolutionBand;
}

interface Check {
  readonly name: string;
  readonly of: string;
  readonly value: number;
  readonly error: number;
  readonly n: number;
}

function checksOf({ cross_checks: { bouguer, high_low: pair, colour_pairs: colours } }: SolutionBand) {
  const checks: Check[] = bouguer.map(({ star, extinction, error, n }) => ({
    name: `Bouguer line of ${star}`,
    of: 'extinction',
    value: extinction,
    error,
    n,
  }));
  if (pair !== null) {
    checks.push({ ...pair, name: 'High and low stars', of: 'extinction', value: pair.extinction });
  }
  if (colours !== null) {
    checks.push({ ...colours, name: 'Pairs of colours', of: 'colour term', value: colours.colour_term });
  }
  return checks;
}

/** Simpler estimates of the same coefficients, beside those of the fit: they should agree within their errors. */
export function CrossChecks({ band, found }: CrossChecksProps) {
  const checks = checksOf(found);
  return (
    <section aria-label={`Cross-checks in ${band}`} className="mb-2">
      <h3 className="px-3.5 pt-2 text-small font-semibold">{band}</h3>
      {checks.length === 0 ? (
        <p className="px-3.5 text-table text-ink-2">
          No star has the range of airmass, and no pair the contrast, that a check needs.
        </p>
      ) : (
        <DataTable
          caption={`Cross-checks in ${band}`}
          head={
            <tr>
              <HeadCell>Check</HeadCell>
              <HeadCell>Of</HeadCell>
              <HeadCell numeric>Estimate</HeadCell>
              <HeadCell numeric>From</HeadCell>
            </tr>
          }
        >
          {['extinction', 'colour_term'].map((name) => {
            const fitted = found.coefficients.find((one) => one.name === name);
            return fitted === undefined ? null : (
              <Row key={name} className="font-medium">
                <Cell heading>The fit</Cell>
                <Cell>{name.replace('_', ' ')}</Cell>
                <Cell numeric>
                  <Figure value={fitted.value} error={fitted.error} decimals={4} />
                </Cell>
                <Cell numeric>{formatCount(found.n_used)}</Cell>
              </Row>
            );
          })}
          {checks.map(({ name, of, value, error, n }) => (
            <Row key={name}>
              <Cell heading className="whitespace-normal!">
                {name}
              </Cell>
              <Cell>{of}</Cell>
              <Cell numeric>
                <Figure value={value} error={error} />
              </Cell>
              <Cell numeric>{formatCount(n)}</Cell>
            </Row>
          ))}
        </DataTable>
      )}
    </section>
  );
}
