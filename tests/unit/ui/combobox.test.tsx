import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, describe, expect, it } from 'vitest';
import { Combobox } from '@/app/_components/ui/combobox';

const options = [{ value: 'U' }, { value: 'B' }, { value: 'V' }];

function BandField() {
  const [band, setBand] = useState('B');
  return <Combobox control={{ id: 'band' }} value={band} onChange={setBand} options={options} />;
}

async function typed(keys: string): Promise<string> {
  render(<BandField />);
  const field = screen.getByRole<HTMLInputElement>('combobox');
  await userEvent.click(field);
  await userEvent.clear(field);
  await userEvent.keyboard(keys);
  return field.value;
}

afterEach(cleanup);

describe('a combobox', () => {
  it('takes at Enter the option that was typed as it stands, not the first of the list', async () => {
    expect(await typed('V{Enter}')).toBe('V');
  });

  it('takes at Enter the first option that begins as typed', async () => {
    expect(await typed('v{Enter}')).toBe('V');
  });

  it('keeps at Esc what was typed', async () => {
    expect(await typed('Q{Escape}')).toBe('Q');
  });
});
