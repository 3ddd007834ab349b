import { cleanup, render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useState } from 'react';
import { afterEach, describe, expect, it } from 'vitest';
import { Combobox } from '@/app/_components/ui/combobox';

afterEach(cleanup);

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

const names = ['Gorse 2', 'LV Marrow', 'Thistle 3', 'SA 92', 'SA 98', 'SA 110'];

function Typed({ options = names }: { readonly options?: readonly string[] }) {
  const [value, setValue] = useState('');
  return (
    <Combobox
      control={{ id: 'object' }}
      value={value}
      onChange={setValue}
      options={options.map((option) => ({ value: option }))}
    />
  );
}

async function typing(text: string, options?: readonly string[]): Promise<string> {
  render(<Typed {...(options ? { options } : {})} />);
  await userEvent.type(screen.getByRole('combobox'), text);
  return screen.getByRole<HTMLInputElement>('combobox').value;
}

describe('a text with suggestions', () => {
  it.each(['{Tab}', '{Enter}'])('takes the first that fits what was typed, at %s', async (key) => {
    expect(await typing(`thi${key}`)).toBe('Thistle 3');
  });

  it.each(names)('keeps %s when it was typed in full, at Tab and at Enter', async (name) => {
    expect(await typing(`${name}{Tab}`)).toBe(name);
    cleanup();
    expect(await typing(`${name}{Enter}`)).toBe(name);
  });

  it('keeps a name typed in full that stands too far down to be listed', async () => {
    const many = Array.from({ length: 80 }, (_, index) => `Field ${index}`);
    expect(await typing('Field 77{Tab}', many)).toBe('Field 77');
  });

  it('keeps what is no option, and what was typed when Esc closes the list', async () => {
    expect(await typing('Comet of last week{Tab}')).toBe('Comet of last week');
    cleanup();
    expect(await typing('thi{Escape}{Tab}')).toBe('thi');
  });

  it('takes what the arrows chose', async () => {
    expect(await typing('SA{ArrowDown}{Enter}')).toBe('SA 98');
  });
});
