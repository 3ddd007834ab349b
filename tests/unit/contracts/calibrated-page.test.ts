import { describe, expect, it } from 'vitest';
import { calibratedPageQuery } from '@/lib/contracts/calibrated-page';

describe('the address of a list of calibrated magnitudes', () => {
  it('is read part by part', () => {
    const address = {
      programme: 'MH26B-04',
      v_from: '12.5',
      clean: '1',
      sort: 'V_total',
      page: '3',
      at: '0',
    };
    expect(calibratedPageQuery(address)).toEqual({
      programme: 'MH26B-04',
      v_from: 12.5,
      clean: true,
      sort: 'V_total',
      page: 3,
      at: 0,
    });
  });

  it('takes a comma and a true minus sign for what they are', () => {
    expect(calibratedPageQuery({ bv_from: '−0,25', bv_to: ' 1.6 ' })).toEqual({ bv_from: -0.25, bv_to: 1.6 });
  });

  it('leaves out what cannot be read, so that the list never fails for an address', () => {
    const address = {
      v_from: '1e9',
      v_to: 'faint',
      sort: 'star_no; DROP',
      page: '0',
      at: '-1',
      clean: 'yes',
    };
    expect(calibratedPageQuery(address)).toEqual({});
    expect(calibratedPageQuery({ star: '', page: ['1', '2'] })).toEqual({});
  });

  it('tells targets of no programme from no choice of a programme', () => {
    expect(calibratedPageQuery({ programme: '' })).toEqual({ programme: '' });
  });
});
