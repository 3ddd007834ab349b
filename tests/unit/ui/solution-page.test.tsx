import { cleanup, fireEvent, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { CoefficientPanel } from '../../../app/(desk)/solutions/[id]/_components/coefficient-panel';
import { EvidencePanel } from '../../../app/(desk)/solutions/[id]/_components/evidence-panel';
import { FindingList } from '../../../app/(desk)/solutions/[id]/_components/finding-list';
import type { Selection } from '../../../app/(desk)/solutions/[id]/_components/observation-list';
import { ObservationTable } from '../../../app/(desk)/solutions/[id]/_components/observation-table';
import { ResidualChart } from '../../../app/(desk)/solutions/[id]/_components/residual-chart';
import { residualAxis, residualPlot } from '../../../app/(desk)/solutions/[id]/_components/residual-points';
import { chart, placer } from '../../../app/(desk)/solutions/[id]/_components/chart-geometry';
import { observation } from '../components/solutions/observation';
import { coefficient, solution, solvedBand } from '../components/solutions/solution';

beforeAll(() => {
  // jsdom lays nothing out and captures no pointer.
  globalThis.ResizeObserver = class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
  Element.prototype.setPointerCapture = () => {};
});
afterEach(cleanup);

const rows = [
  observation({ star: '114-750', airmass: 1.1, residual: 0.011 }),
  observation({ star: '95-41', airmass: 1.9, residual: -0.004, band: 'B' }),
  observation({ star: '114-670', airmass: 1.5, residual: 0.03, used: false, reason: 'another star?' }),
];
const plot = residualPlot(rows, 'airmass', residualAxis(rows));
const width = 500;

function Linked() {
  const [selection, select] = useState<Selection>(new Set());
  return (
    <>
      <ResidualChart
        plot={plot}
        title="Airmass"
        width={width}
        selection={selection}
        onSelect={select}
        words={(id) => rows.find((one) => one.observation === id)?.star ?? ''}
      />
      <ObservationTable
        rows={rows}
        colourIndex="B−V"
        hasNights={false}
        sorting={null}
        onSort={() => {}}
        selection={selection}
        onSelect={select}
      />
    </>
  );
}

const selectedStars = () =>
  screen
    .getAllByRole<HTMLInputElement>('checkbox')
    .filter(({ checked }) => checked)
    .map((box) => within(box.closest('tr') as HTMLElement).getByRole('rowheader').textContent);
const rings = (container: HTMLElement) => container.querySelectorAll('[data-ring]').length;

describe('plot and table of residuals', () => {
  it('draw a mark for each observation, by recharts and where the overlay expects it, the rejected crossed', () => {
    const { container } = render(<Linked />);
    const marks = [...container.querySelectorAll('.recharts-scatter-symbol path')];
    expect(marks).toHaveLength(3);
    expect(container.querySelectorAll('[data-rejected]')).toHaveLength(1);
    const first = plot.points[0];
    const { x } = placer(plot, width)(first ?? { x: 0, y: 0 });
    const drawn = /^M([\d.]+) ([\d.]+)/.exec(marks[0]?.getAttribute('d') ?? '');
    // V’s square begins 0.9 of its half size to the left.
    expect(Math.abs(Number(drawn?.[1]) + 0.9 * 3.1 - x)).toBeLessThan(0.6);
  });

  it('a click on a mark selects its row; a row that is clicked is ringed in the plot', async () => {
    const { container } = render(<Linked />);
    const slider = screen.getByRole('slider');
    const { x, y } = placer(plot, width)(plot.points[1] ?? { x: 0, y: 0 });
    fireEvent.pointerDown(slider, { button: 0, pointerId: 1, clientX: x + 3, clientY: y - 2 });
    fireEvent.pointerUp(slider, { pointerId: 1, clientX: x + 3, clientY: y - 2 });
    expect(selectedStars()).toEqual(['95-41']);
    await userEvent.click(screen.getByRole('cell', { name: 'another star?' }));
    expect(selectedStars()).toEqual(['114-670']);
    expect(rings(container)).toBe(1);
  });

  it('a drag selects all in the box, and a click on nothing clears', () => {
    const { container } = render(<Linked />);
    const slider = screen.getByRole('slider');
    fireEvent.pointerDown(slider, { button: 0, pointerId: 1, clientX: chart.yAxis, clientY: 0 });
    fireEvent.pointerMove(slider, { pointerId: 1, clientX: width, clientY: chart.height });
    fireEvent.pointerUp(slider, { pointerId: 1, clientX: width, clientY: chart.height });
    expect(rings(container)).toBe(3);
    fireEvent.pointerDown(slider, { button: 0, pointerId: 1, clientX: 2, clientY: 2 });
    fireEvent.pointerUp(slider, { pointerId: 1, clientX: 2, clientY: 2 });
    expect(rings(container)).toBe(0);
  });

  it('the keyboard goes from mark to mark along the axis and selects by Space', async () => {
    render(<Linked />);
    const slider = screen.getByRole('slider');
    slider.focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(slider.getAttribute('aria-valuetext')).toBe('114-750');
    await userEvent.keyboard('{End}{ArrowLeft} ');
    expect(slider.getAttribute('aria-valuetext')).toBe('114-670, selected');
    expect(selectedStars()).toEqual(['114-670']);
    await userEvent.keyboard('{Escape}');
    expect(selectedStars()).toEqual([]);
  });

  it('the arrows go from row to row and select with Shift', async () => {
    render(<Linked />);
    screen.getAllByRole('checkbox')[0]?.focus();
    await userEvent.keyboard('{ArrowDown}{Shift>}{ArrowDown}{/Shift}');
    expect(selectedStars()).toEqual(['114-670']);
  });
});

describe('the coefficients', () => {
  it('stand with their errors, how they entered, and their change in errors', () => {
    const before = { number: 2, found: { V: solvedBand([coefficient('extinction', 0.1522, 0.003)]) } };
    render(<CoefficientPanel title="Coefficients" found={solution().bands} before={before} />);
    const table = screen.getByRole('table', { name: 'Coefficients' });
    const row = within(table).getByRole('row', { name: /^Extinction/ });
    const [inB, inV] = within(row).getAllByRole('cell');
    expect(inB?.textContent).toBe('0.2587± 0.0041 ');
    expect(inV?.textContent).toBe('0.1493± 0.0029 change −1.0');
    const second = within(table).getByRole('row', { name: /^Second-order extinction/ });
    expect(second.textContent).toContain('prior −0.030 ± 0.010');
    expect(second.textContent).toContain('0fixed');
  });

  it('give no number for one that is not determined', () => {
    const found = { V: solvedBand([coefficient('extinction', null, null)], { outcome: 'undetermined' }) };
    render(<CoefficientPanel title="Coefficients" found={found} before={null} />);
    const row = screen.getAllByRole('row', { name: /^Extinction/ })[0];
    expect(within(row as HTMLElement).getByRole('cell').textContent).toBe('not determined');
  });
});

describe('evidence and findings', () => {
  it('say by a word what speaks for the night and what against', () => {
    render(<EvidencePanel solution={solution()} />);
    expect(screen.getByText('For').parentElement?.textContent).toContain('within 0.02 and 0.03');
    expect(screen.getByText('Take care').parentElement?.textContent).toContain('Frames 29 to 31');
    expect(screen.getByText('1.04 to 2.11')).toBeTruthy();
  });

  it('stand together where they are alike, what speaks against the night first', () => {
    const said = (speaks: 'for' | 'care' | 'against', kind: string, words: string) =>
      ({ speaks, kind, band: null, words }) as const;
    const evidence = [
      said('for', 'drift', 'No drift in B.'),
      said('for', 'drift', 'No drift in V.'),
      said('against', 'scatter', 'Scatter in B.'),
    ];
    render(<EvidencePanel solution={solution({ evidence })} />);
    const words = screen.getAllByText(/^(For|Against)$/).map((one) => one.parentElement?.textContent);
    expect(words.map((one) => one?.trim())).toEqual([
      expect.stringMatching(/Against ?Scatter in B\.$/),
      expect.stringMatching(/For ?No drift in B\.No drift in V\.$/),
    ]);
  });

  it('say in a table what was checked in many bands', () => {
    const band = solvedBand([coefficient('extinction', 0.1, 0.003)]);
    render(<EvidencePanel solution={solution({ bands: { B: band, V: band, I: band } })} />);
    const checks = screen.getByRole('table', { name: 'Checks of the fit' });
    expect(within(checks).getByRole('row', { name: /^V/ }).textContent).toBe('V19:24 to 05:120.40.011');
  });

  it('give reason and remedy, what stops the fit first', async () => {
    const note = {
      weight: 'note',
      kind: 'frames',
      band: null,
      night_date: null,
      coefficient: null,
      reason: 'One star on each frame.',
      remedy: '',
    } as const;
    const stop = {
      ...note,
      weight: 'stop',
      band: 'V',
      coefficient: 'extinction',
      reason: 'The airmass in V ranges over 0.22 only.',
      remedy: 'Hold it at the site’s mean.',
    } as const;
    render(<FindingList findings={[note, stop]} />);
    const items = screen.getAllByRole('listitem').map(({ textContent }) => textContent);
    await waitFor(() =>
      expect(items[0]).toContain('The airmass in V ranges over 0.22 only.Hold it at the site’s mean.'),
    );
    expect(items[1]).toBe('One star on each frame.');
  });

  it('say of which night they are where several were solved together', () => {
    const finding = {
      weight: 'caution',
      kind: 'frames',
      band: 'V',
      night_date: '2026-11-03',
      coefficient: null,
      reason: 'Look.',
      remedy: '',
    } as const;
    render(<FindingList findings={[finding]} isJoint />);
    expect(screen.getByRole('listitem').textContent).toContain('3 November 2026: Look.');
  });
});
