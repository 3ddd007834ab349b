import { cleanup, fireEvent, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, beforeAll, describe, expect, it } from 'vitest';
import { useState } from 'react';
import type { AddressStretch } from '@/app/_components/hooks/stretch-address';
import { NightBand } from '@/app/_components/charts/night-band/night-band';
import { autumnNight, frame } from '../components/night-band/night';

const now = Date.parse('2026-11-03T23:00:00Z');
const frames = [
  frame('2026-11-03T22:45:00Z', { number: 41 }),
  frame('2026-11-03T22:50:00Z', { number: 42, type: 'target', band: 'B', object: 'Thistle 3' }),
];

function Page({ time = now }: { readonly time?: number }) {
  const [selected, select] = useState<AddressStretch | null>(null);
  return (
    <NightBand
      sky={autumnNight()}
      frames={frames}
      conditions={[]}
      now={time}
      selected={selected}
      onSelect={select}
    />
  );
}

beforeAll(() => {
  // jsdom lays nothing out, so there is nothing to observe.
  globalThis.ResizeObserver = class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
});
afterEach(cleanup);

describe('the night band', () => {
  it('is moved by the arrows, selects with shift and says what is selected', async () => {
    render(<Page />);
    const strip = screen.getByRole('slider');
    strip.focus();
    expect(strip.getAttribute('aria-valuetext')).toBe('23:00 UTC, nothing selected');
    await userEvent.keyboard('{Shift>}{ArrowLeft}{ArrowLeft}{ArrowLeft}{ArrowLeft}{/Shift}');
    expect(strip.getAttribute('aria-valuetext')).toBe('22:40 UTC, selected 22:40 to 23:00, 2 frames');
    expect(screen.getByText('Selected: 22:40 to 23:00, 2 frames.')).toBeTruthy();
  });

  it('goes from end to end also when the night is long past', async () => {
    render(<Page time={now + 30 * 86_400_000} />);
    const strip = screen.getByRole('slider');
    expect(Number(strip.getAttribute('aria-valuenow'))).toBeLessThanOrEqual(
      Number(strip.getAttribute('aria-valuemax')),
    );
    strip.focus();
    await userEvent.keyboard('{Home}{Shift>}{End}{/Shift}');
    expect(strip.getAttribute('aria-valuetext')).toMatch(/selected 18:23 to 07:23, 2 frames/);
  });

  it('is cleared by Esc and by the button', async () => {
    render(<Page />);
    const strip = screen.getByRole('slider');
    strip.focus();
    await userEvent.keyboard('{Shift>}{PageDown}{/Shift}{Escape}');
    expect(strip.getAttribute('aria-valuetext')).toContain('nothing selected');
    await userEvent.keyboard('{Shift>}{PageDown}{/Shift}');
    await userEvent.click(screen.getByRole('button', { name: 'Clear' }));
    expect(strip.getAttribute('aria-valuetext')).toContain('nothing selected');
  });

  it('turns round at the first end when the arrows go back over it', async () => {
    render(<Page />);
    screen.getByRole('slider').focus();
    await userEvent.keyboard('{Shift>}{ArrowLeft}{ArrowRight}{ArrowRight}{/Shift}');
    expect(screen.getByRole('slider').getAttribute('aria-valuetext')).toContain('23:00 to 23:05');
  });

  it('tells the same in a table', () => {
    render(<Page />);
    fireEvent.click(screen.getByText('The night as a table'));
    const table = screen.getByRole('table', { name: 'The night, hour by hour' });
    expect(table.textContent).toContain('1 standard V, 1 target B');
    expect(table.querySelectorAll('tbody tr').length).toBeGreaterThan(11);
  });
});
