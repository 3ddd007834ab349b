import type { Figure } from './bench';

const head = ['name', 'figure', 'baseline', 'ratio', 'aim', 'verdict'] as const;

const ratioOf = ({ measured, baseline }: Figure): number | null =>
  baseline === null ? null : measured / baseline;

/** Whether the aim is met; null where there is none. */
export function isMet(figure: Figure): boolean | null {
  if (figure.aim === null) return null;
  return (ratioOf(figure) ?? figure.measured) <= figure.aim;
}

const amount = (value: number, unit: string): string =>
  `${value < 100 ? value.toPrecision(3) : value.toFixed(0)} ${unit}`;

function cells(figure: Figure): readonly string[] {
  const { name, measured, baseline, unit, aim } = figure;
  const ratio = ratioOf(figure);
  const met = isMet(figure);
  return [
    name,
    amount(measured, unit),
    baseline === null ? '–' : amount(baseline, unit),
    ratio === null ? '–' : `${ratio.toFixed(2)} ×`,
    aim === null ? '–' : ratio === null ? `≤ ${amount(aim, unit)}` : `≤ ${aim} ×`,
    met === null ? 'told' : met ? 'met' : 'MISSED',
  ];
}

/** The figures as a table of plain text. */
export function figureTable(figures: readonly Figure[]): string {
  const rows = [head, ...figures.map(cells)];
  const widths = head.map((_, column) => Math.max(...rows.map((row) => (row[column] ?? '').length)));
  const line = (row: readonly string[]): string =>
    row
      .map((cell, column) =>
        column === 0 ? cell.padEnd(widths[0] ?? 0) : cell.padStart(widths[column] ?? 0),
      )
      .join('   ');
  return rows.map(line).join('\n');
}
