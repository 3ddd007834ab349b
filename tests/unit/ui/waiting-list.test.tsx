import { cleanup, render, screen } from '@testing-library/react';
import { afterEach, describe, expect, it } from 'vitest';
import { WaitingList } from '../../../app/(log)/_components/waiting-list';
import type { Waiting } from '@/lib/contracts/waiting';

const none = { n: 0, first: [] } as const;
const nothing: Waiting = {
  openNights: none,
  refusedSets: none,
  unsolvedNights: none,
  ownDrafts: none,
  toDecide: none,
  newResults: none,
  invited: none,
  nFailedJobs: 0,
};
const night = { night: 'nnnnnnnnnnnn', date: '2026-11-03', telescope: 'Larkspur 0.8 m' } as const;

afterEach(cleanup);

describe('what waits for a person', () => {
  it('is not there at all where nothing waits', () => {
    const { container } = render(<WaitingList waiting={nothing} />);
    expect(container.textContent).toBe('');
  });

  it('leads to each thing, with what there is to know before', () => {
    const result = { ...night, programme: 'MH26B-04', nStars: 1184, verdict: 'photometric' } as const;
    render(<WaitingList waiting={{ ...nothing, newResults: { n: 1, first: [result] } }} />);
    const link = screen.getByRole('link', { name: 'MH26B-04, 3 November 2026, Larkspur 0.8 m' });
    expect(link.getAttribute('href')).toBe('/nights/nnnnnnnnnnnn/results?programme=MH26B-04');
    expect(link.parentElement?.textContent).toContain('photometric, 1,184 stars');
    expect(screen.queryByText(/more$/)).toBeNull();
  });

  it('folds what is more than a few, and says how many there are that it does not name', () => {
    const first = Array.from({ length: 7 }, (_, k) => ({ ...night, night: `nnnnnnnnnnn${k}` }));
    render(<WaitingList waiting={{ ...nothing, openNights: { n: 9, first }, nFailedJobs: 2 }} />);
    const fold = screen.getByText('4 more').parentElement;
    expect(fold?.querySelectorAll('a')).toHaveLength(2);
    expect(fold?.textContent).toContain('and 2 that are named here when these are done');
    expect(screen.getByRole('link', { name: 'See the list' }).getAttribute('href')).toBe(
      '/jobs?state=failed',
    );
  });

  it('says of a draft what it lacks', () => {
    const draft = {
      ...night,
      solution: 'ssssssssssss',
      number: 3,
      outcome: 'undetermined',
      proposedBy: null,
    } as const;
    render(<WaitingList waiting={{ ...nothing, ownDrafts: { n: 1, first: [draft] } }} />);
    expect(screen.getByText(/undetermined/)).toBeTruthy();
  });
});
