import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { NoResult } from '../../../app/(log)/nights/[id]/results/_components/no-result';
import { ResultsView } from '../../../app/(log)/nights/[id]/results/_components/results-view';
import { AppRouterContext } from 'next/dist/shared/lib/app-router-context.shared-runtime';
import type { CalibratedPage, CalibratedResult, NumberedStar } from '@/lib/contracts/calibrated-page';

const none = { UB: null, VR: null, VI: null } as const;
const parts = (name: string, value: number | null, error: number | null) => ({
  [name]: value,
  [`${name}_random`]: error,
  [`${name}_systematic`]: error === null ? null : error / 2,
  [`${name}_total`]: error === null ? null : Math.hypot(error, error / 2),
});

function star(no: number, over: Partial<NumberedStar>): NumberedStar {
  const { V = 12.3456, BV = 0.512 } = over;
  return {
    ...{ no, star: `T ${no}`, ra: 83.5, dec: 22.1, n_U: 0, n_B: 2, n_V: 3, n_R: 0, n_I: 0 },
    ...parts('V', V, 0.01),
    ...parts('BV', BV, BV === null ? null : 0.02),
    ...parts('B', null, null),
    ...Object.assign({}, ...Object.keys(none).map((name) => parts(name, null, null))),
    ...{ bjd_tdb: 2461348.5, airmass: 1.234, flags: [] },
    ...{ programme: 'MH26B-04', solution: 'abcdefghjkmn', night: '2026-11-03' },
    ...over,
  } as NumberedStar;
}

const result: CalibratedResult = {
  origin: {
    observatory: 'Marrow Hill Observatory',
    telescope: 'larkspur',
    solution: 'abcdefghjkmn',
    number: 2,
    state: 'approved',
    verdict: 'usable with care',
    approvedBy: 'Ines Calloway',
    approvedAt: '2026-11-04T10:00:00.000Z',
    standardsSource: 'Landolt 1992',
    softwareVersion: '1.0.0',
    calculatedAt: '2026-11-04T10:01:00.000Z',
  },
  has: { B: false, UB: false, VR: false, VI: false },
  nStars: 1184,
  nShown: 250,
  nClean: 1100,
  cautions: [{ flag: 'colour_range', nStars: 84 }],
  stars: [star(1, {}), star(2, { flags: ['colour_range', 'low_signal'] }), star(3, { BV: null })],
  page: 2,
  nPages: 3,
  diagram: [
    { no: 1, star: 'T 1', V: 12.3456, BV: 0.512, hasCautions: false },
    { no: 2, star: 'T 2', V: 14, BV: 1.2, hasCautions: true },
    { no: 77, star: 'T 77', V: 11, BV: 0.1, hasCautions: false },
  ],
  nDiagram: 9000,
};
const page: CalibratedPage = {
  night: 'nnnnnnnnnnnn',
  programmes: [{ code: 'MH26B-04', title: 'Thistle' }],
  programme: 'MH26B-04',
  solutions: [
    { id: 'abcdefghjkmn', number: 2, state: 'approved' },
    { id: 'bbbbbbbbbbbb', number: 1, state: 'superseded' },
  ],
  result,
};

const router = {
  push: vi.fn(),
  refresh: vi.fn(),
  replace: vi.fn(),
  back: vi.fn(),
  forward: vi.fn(),
  prefetch: vi.fn(),
};
const show = (ui: React.ReactNode) =>
  render(<AppRouterContext.Provider value={router as never}>{ui}</AppRouterContext.Provider>);

beforeAll(() => {
  // jsdom lays nothing out: there is nothing to observe, nor to scroll.
  globalThis.ResizeObserver = class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
  Element.prototype.scrollIntoView = () => {};
});
beforeEach(() => vi.clearAllMocks());
afterEach(cleanup);

const rowOf = (name: string): HTMLElement =>
  screen.getByRole('button', { name }).closest('tr') ?? document.body;

describe('the results of a night', () => {
  it('show each magnitude beside its total error, in the digits that the error supports', () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    expect(rowOf('T 1').textContent).toContain('12.346 ± 0.011');
    expect(rowOf('T 1').textContent).toContain('2 B, 3 V');
    expect(rowOf('T 3').textContent).toContain('–');
  });

  it('show the parts of the errors when they are asked for', async () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    expect(rowOf('T 1').textContent).not.toContain('systematic');
    await userEvent.click(screen.getByRole('checkbox', { name: 'Parts of the errors' }));
    expect(rowOf('T 1').textContent).toContain('0.010 random, 0.005 systematic');
  });

  it('say cautions in words, with how many stars carry them', () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    expect(rowOf('T 2').textContent).toContain('Colour outside the range of the standards; Low signal');
    expect(screen.getByText('1,100 of 1,184 stars have none of their own')).toBeTruthy();
  });

  it('say once, not at each star, that the night is usable with care', () => {
    const stars = [star(1, { flags: ['low_signal', 'night_with_care'] })];
    const cautions = [
      { flag: 'night_with_care', nStars: 1184 },
      { flag: 'low_signal', nStars: 84 },
    ] as const;
    show(<ResultsView page={page} result={{ ...result, stars, cautions }} query={{}} />);
    expect(rowOf('T 1').textContent).toContain('Low signal');
    expect(screen.queryByText(/The night is usable with care/)).toBeNull();
    expect(screen.getAllByText(/judged usable with care/)).toHaveLength(1);
  });

  it('mark the row of a star that is chosen in the diagram', () => {
    const { container } = show(<ResultsView page={page} result={result} query={{}} />);
    const dot = container.querySelector('[data-star="2"]');
    return userEvent.click(dot as Element).then(() => {
      expect(rowOf('T 2').getAttribute('aria-selected')).toBe('true');
      expect(document.activeElement).toBe(rowOf('T 2'));
      expect(router.push).not.toHaveBeenCalled();
    });
  });

  it('lead to the page with its row when that is another one', async () => {
    const { container } = show(<ResultsView page={page} result={result} query={{ sort: 'V', page: 2 }} />);
    await userEvent.click(container.querySelector('[data-star="77"]') as Element);
    expect(router.push).toHaveBeenCalledWith('/nights/nnnnnnnnnnnn/results?sort=V&at=77', { scroll: false });
  });

  it('draw bright stars above faint ones, and blue ones on the left', () => {
    const { container } = show(<ResultsView page={page} result={result} query={{}} />);
    const place = (no: number, axis: string) =>
      Number(container.querySelector(`[data-star="${no}"]`)?.getAttribute(axis));
    expect(place(77, 'cy')).toBeLessThan(place(1, 'cy'));
    expect(place(1, 'cy')).toBeLessThan(place(2, 'cy'));
    expect(place(77, 'cx')).toBeLessThan(place(1, 'cx'));
  });

  it('lay the mark of a chosen star over its point', async () => {
    const { container } = show(<ResultsView page={page} result={result} query={{}} />);
    await userEvent.click(screen.getByRole('button', { name: 'T 2' }));
    const [dot, mark] = [
      container.querySelector('[data-star="2"]'),
      container.querySelector('circle[r="8"]'),
    ];
    for (const axis of ['cx', 'cy']) {
      expect(Math.abs(Number(mark?.getAttribute(axis)) - Number(dot?.getAttribute(axis)))).toBeLessThan(0.5);
    }
  });

  it('say how many of the stars the diagram draws', () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    expect(screen.getByText(/An even choice of 3 of 9,000 stars/)).toBeTruthy();
  });

  it('say that they open by V, and turn the order round at the first press on it', () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    const head = screen.getByRole('columnheader', { name: /^V/ });
    expect(head.getAttribute('aria-sort')).toBe('ascending');
    expect(head.textContent).toContain('▲');
    expect(screen.getByText('250 of 1,184 stars, by V')).toBeTruthy();
    expect(within(head).getByRole('link').getAttribute('href')).toContain('sort=V&descending=1');
  });

  it('have their cautions beside the magnitudes, before what one looks up', () => {
    show(<ResultsView page={page} result={result} query={{}} />);
    const heads = screen.getAllByRole('columnheader').map(({ textContent }) => textContent);
    expect(heads.slice(2, 5)).toEqual(['B−Vmag', 'Cautions', 'Measurementsused']);
  });

  it('sort by a press on a head, and the other way round by the next', () => {
    show(<ResultsView page={page} result={result} query={{ sort: 'V', v_to: 15, page: 2 }} />);
    const head = screen.getByRole('columnheader', { name: /^V mag|^V ▲|^V/ });
    expect(head.getAttribute('aria-sort')).toBe('ascending');
    expect(within(head).getByRole('link').getAttribute('href')).toBe(
      '/nights/nnnnnnnnnnnn/results?sort=V&v_to=15&descending=1',
    );
  });

  it('lead to the pages before and after, in the same order', () => {
    show(<ResultsView page={page} result={result} query={{ sort: 'V', page: 2 }} />);
    const pages = screen.getByRole('navigation', { name: 'Pages of stars' });
    expect(pages.textContent).toContain('Stars 101 to 103 of 250');
    expect(within(pages).getByRole('link', { name: 'Next' }).getAttribute('href')).toContain('sort=V&page=3');
    expect(within(pages).getByRole('link', { name: 'Previous' }).getAttribute('href')).not.toContain('page');
  });

  it('are downloaded whole, of the programme and the solution that are shown', () => {
    show(<ResultsView page={page} result={result} query={{ v_to: 13 }} />);
    expect(screen.getByRole('link', { name: 'CSV' }).getAttribute('href')).toBe(
      '/api/v1/nights/nnnnnnnnnnnn/calibrated?format=csv&solution=abcdefghjkmn&programme=MH26B-04',
    );
  });

  it('say that a later solution has superseded them', () => {
    const old = { ...result, origin: { ...result.origin, state: 'superseded' as const } };
    show(<ResultsView page={page} result={old} query={{ solution: 'abcdefghjkmn' }} />);
    expect(screen.getByText(/A later solution has superseded this one/)).toBeTruthy();
  });

  it('say what to do when no star is let through', () => {
    show(
      <ResultsView
        page={page}
        result={{ ...result, stars: [], nShown: 0, diagram: [] }}
        query={{ v_to: 1 }}
      />,
    );
    expect(screen.getByText('No star is like that')).toBeTruthy();
    expect(screen.getByText('No star of the list has both V and B−V.')).toBeTruthy();
  });
});

describe('a night without results', () => {
  const running = { why: 'running', solution: 'abcdefghjkmn', mayStart: false } as const;

  it.each([
    ['hidden', 'Not yours to see'],
    ['no-solution', 'No approved solution yet'],
    ['no-targets', 'No calibrated stars'],
  ] as const)('says why: %s', (why, title) => {
    show(<NoResult page={{ ...page, solutions: [] }} reason={{ why }} />);
    expect(screen.getByText(title)).toBeTruthy();
  });

  it('says that the night was judged not photometric, and leads to who judged', () => {
    show(<NoResult page={page} reason={{ why: 'not-photometric', solution: 'abcdefghjkmn' }} />);
    expect(screen.getByText('Not photometric')).toBeTruthy();
    const link = screen.getByRole('link', { name: 'The solution' });
    expect(link.getAttribute('href')).toBe('/solutions/abcdefghjkmn');
    expect(screen.getByRole('link', { name: 'solution 1, superseded' })).toBeTruthy();
  });

  it('shows how far the transformation is', () => {
    show(<NoResult page={page} reason={{ ...running, job: null }} />);
    expect(screen.getByRole('progressbar').getAttribute('aria-valuetext')).toBe('under way');
    expect(screen.getByRole('link', { name: 'solution 1, superseded' })).toBeTruthy();
  });

  it.each([
    ['cancelled', 'The transformation was cancelled'],
    ['failed', 'The transformation failed'],
  ] as const)('offers to start one that was %s again, to those who may', (state, title) => {
    const job = { id: 'jjjjjjjjjjjj', state, progress: 0.4, message: '' };
    show(<NoResult page={page} reason={{ ...running, job, mayStart: true }} />);
    expect(screen.getByText(title)).toBeTruthy();
    const button = screen.getByRole('button', { name: 'Transform the targets' });
    expect(button.closest('form')?.querySelector('input')?.value).toBe('abcdefghjkmn');
    cleanup();
    show(<NoResult page={page} reason={{ ...running, job }} />);
    expect(screen.queryByRole('button')).toBeNull();
    expect(screen.getByText(/A photometrist or a manager can start the transformation again/)).toBeTruthy();
  });
});
