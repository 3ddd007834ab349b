import { describe, expect, it } from 'vitest';
import {
  readSolveForm,
  solveForm,
  usualWords,
  type SolveForm,
  type TermLine,
} from '../../../../app/(log)/nights/[id]/solutions/_components/solve-form';
import type { Band } from '@/lib/contracts/bands';
import type { ApiCoefficient } from '@/lib/contracts/coefficients';
import { SolveOptions } from '@/lib/contracts/solve-options';

const available = ['B', 'V'] as const;
const usual = solveForm(available);

function changed(band: Band, name: ApiCoefficient, line: TermLine, form: SolveForm = usual): SolveForm {
  return { ...form, terms: { ...form.terms, [band]: { ...form.terms[band], [name]: line } } };
}

function asked(form: SolveForm): unknown {
  const read = readSolveForm(form, available);
  return read.ok ? SolveOptions.parse(read.options) : read.faults;
}

describe('the form of a solve', () => {
  it('untouched, asks for the usual model and says nothing about it', () => {
    expect(asked(usual)).toEqual(SolveOptions.parse({}));
  });

  it('asks for a value known beforehand, for one held, and for a term left out', () => {
    const withPrior = changed('V', 'extinction', { mode: 'prior', value: '0.15', error: '0.02' });
    const withFixed = changed(
      'B',
      'second_order_extinction',
      { mode: 'fixed', value: '−0.04', error: '' },
      withPrior,
    );
    const form = changed('V', 'colour_term', { mode: 'none', value: '', error: '' }, withFixed);
    expect(asked(form)).toMatchObject({
      priors: { V: { extinction: { value: 0.15, error: 0.02 } } },
      terms: { B: { second_order_extinction: { fixed: -0.04 } }, V: { colour_term: 'none' } },
    });
  });

  it('takes the usual prior of B away by asking for a free one', () => {
    expect(
      asked(changed('B', 'second_order_extinction', { mode: 'free', value: '', error: '' })),
    ).toMatchObject({ terms: { B: { second_order_extinction: 'free' } }, priors: {} });
  });

  it.each([
    ['V extinction', { mode: 'prior', value: '0.15', error: '0' }, 'Write an error above 0, such as 0.01.'],
    [
      'V extinction',
      { mode: 'fixed', value: '0,15', error: '' },
      'Write a value from −100 to 100, such as −0.03.',
    ],
    [
      'V extinction',
      { mode: 'fixed', value: '', error: '' },
      'Write a value from −100 to 100, such as −0.03.',
    ],
  ] as const)('refuses %s of %o beside its field', (place, line, words) => {
    expect(asked(changed('V', 'extinction', line))).toEqual({ [place]: words });
  });

  it('refuses to solve no band, and names the bands only when they are not all', () => {
    expect(asked({ ...usual, bands: [] })).toEqual({ bands: 'Choose a band.' });
    expect(asked({ ...usual, bands: ['V'] })).toMatchObject({ bands: ['V'] });
  });

  it('begins with the options of an earlier solution, and asks for the same again', () => {
    const options = SolveOptions.parse({
      bands: ['V'],
      terms: { V: { drift: 'free', second_order_extinction: { fixed: 0.01 } } },
      priors: { V: { extinction: { value: 0.14, error: 0.01 } } },
      airmass_formula: 'hardie1962',
      exclusions: [{ observation: '3kq8v7m2t0xc.15', reason: 'cloud' }],
    });
    expect(asked(solveForm(available, options))).toEqual(options);
  });

  it('says the usual model in words with its prior', () => {
    expect(usualWords(available)).toContain('−0.03 ± 0.01 known beforehand in B');
    expect(usualWords(['V'])).toContain('second-order extinction zero;');
  });
});
