import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';

afterEach(cleanup);

function Page({ act }: { readonly act: () => void }) {
  useShortcut('X', act);
  return (
    <>
      <input type="checkbox" aria-label="Selected" />
      <input type="text" aria-label="Comment" />
    </>
  );
}

describe('a shortcut', () => {
  it('works wherever the focus is, a tick box that was just ticked included', async () => {
    const act = vi.fn<() => void>();
    render(<Page act={act} />);
    await userEvent.keyboard('x');
    await userEvent.click(screen.getByRole('checkbox'));
    await userEvent.keyboard('x');
    expect(act).toHaveBeenCalledTimes(2);
  });

  it('is a letter while somebody types, and the browser’s with Control', async () => {
    const act = vi.fn<() => void>();
    render(<Page act={act} />);
    await userEvent.type(screen.getByRole('textbox'), 'x');
    expect(screen.getByRole<HTMLInputElement>('textbox').value).toBe('x');
    screen.getByRole('checkbox').focus();
    await userEvent.keyboard('{Control>}x{/Control}');
    expect(act).not.toHaveBeenCalled();
  });
});
