import { describe, expect, it } from 'vitest';
import { checkTable, loggedFrame, type TestOrder } from '@/tests/support/table-order';

/** Line, column and value of every fault. */
const faultsOf = (content: string | Uint8Array, given?: TestOrder): unknown =>
  checkTable(content, given).result.faults.map(({ line, column, value, message }) => [
    line,
    column,
    value,
    message,
  ]);

const header = 'Frame,Star,RA,Dec,inst_mag,inst_err';
const good = '1,114-750,340.436,1.21,12.5,0.01';

describe('a fault of one field', () => {
  it.each([
    ['frame', ',A,1,1,12,0.01', 'Frame', '', 'There is no value here.'],
    [
      'frame that the log does not have',
      '47,A,1,1,12,0.01',
      'Frame',
      '47',
      'This frame is not in the night log.',
    ],
    ['star and position', '1,,,,12,0.01', 'Star', '', 'There is no value here.'],
    ['a dash for a name and no position', '1,-,,,12,0.01', 'Star', '-', 'There is no value here.'],
    ['ra without dec', '1,A,1,,12,0.01', 'Dec', '', 'There is no value here.'],
    ['dec without ra', '1,A,,1,12,0.01', 'RA', '', 'There is no value here.'],
    ['ra out of range', '1,A,360,1,12,0.01', 'RA', '360', /360 degrees or more/],
    ['negative ra', '1,A,-0.5,1,12,0.01', 'RA', '-0.5', /negative/],
    ['ra that is no angle', '1,A,23:59:61,1,12,0.01', 'RA', '23:59:61', /60 seconds or more/],
    ['dec out of range', '1,A,1,-90.001,12,0.01', 'Dec', '-90.001', /beyond the pole/],
    ['dec that is no angle', '1,A,1,north,12,0.01', 'Dec', 'north', /not a position/],
    ['no magnitude', '1,A,1,1,,0.01', 'inst_mag', '', 'There is no value here.'],
    ['a magnitude that is no number', '1,A,1,1,bright,0.01', 'inst_mag', 'bright', 'This is not a number.'],
    ['a hexadecimal magnitude', '1,A,1,1,0x10,0.01', 'inst_mag', '0x10', 'This is not a number.'],
    ['NaN', '1,A,1,1,NaN,0.01', 'inst_mag', 'NaN', 'This is not a finite number.'],
    ['infinity', '1,A,1,1,-inf,0.01', 'inst_mag', '-inf', 'This is not a finite number.'],
    ['a number beyond all numbers', '1,A,1,1,1e999,0.01', 'inst_mag', '1e999', 'This is not a number.'],
    ['a code for not measured', '1,A,1,1,99.999,0.01', 'inst_mag', '99.999', /beyond ±50/],
    ['no error', '1,A,1,1,12,', 'inst_err', '', 'There is no value here.'],
    ['an error of 0', '1,A,1,1,12,0', 'inst_err', '0', 'A standard error is greater than 0.'],
    ['a negative error', '1,A,1,1,12,-0.01', 'inst_err', '-0.01', 'A standard error is greater than 0.'],
    ['an error that is a code', '1,A,1,1,12,9.999', 'inst_err', '9.999', /says nothing/],
    [
      'a name that is too long',
      `1,${'x'.repeat(81)},1,1,12,0.01`,
      'Star',
      'x'.repeat(81),
      /81 characters; at most 80/,
    ],
    ['a line break in a name', '1,"a\nb",1,1,12,0.01', 'Star', 'a␣b', /line break/],
  ])('%s is reported with line, column and value', (...[, row, column, value, message]) => {
    const { faults } = checkTable(`${header}\n${good}\n${row}\n`).result;
    expect(faults.map((fault) => [fault.line, fault.column, fault.value])).toEqual([[3, column, value]]);
    expect(faults[0]?.message).toMatch(message);
  });

  it('every fault of a row is reported, and every faulty row', () => {
    expect(faultsOf(`${header}\n${good}\n1,,x,100,,\n1,A,1,1,12,0\n`)).toEqual([
      [3, 'RA', 'x', expect.any(String)],
      [3, 'Dec', '100', expect.any(String)],
      [3, 'inst_mag', '', expect.any(String)],
      [3, 'inst_err', '', expect.any(String)],
      [4, 'inst_err', '0', expect.any(String)],
    ]);
  });

  it('a row with a fault of its own is held against the log all the same', () => {
    expect(faultsOf(`${header}\n47,A,1,1,12,0\n`)).toEqual([
      [2, 'inst_err', '0', expect.any(String)],
      [2, 'Frame', '47', 'This frame is not in the night log.'],
    ]);
  });

  it('a remedy stands with every fault', () => {
    const { faults } = checkTable(`${header}\n47,,x,100,NaN,0\n1,A\n`).result;
    expect(faults.length).toBeGreaterThan(4);
    for (const { remedy } of faults) expect(remedy?.length).toBeGreaterThan(10);
  });
});

describe('counts in place of magnitudes', () => {
  const fluxHeader = 'frame,star,flux,flux_err';
  it.each([
    ['no counts', '1,A,,3', 'inst_mag', ''],
    ['counts of 0', '1,A,0,3', 'flux', '0'],
    ['negative counts', '1,A,-5,3', 'flux', '-5'],
    ['no error', '1,A,500,', 'flux_err', ''],
    ['an error of 0', '1,A,500,0', 'flux_err', '0'],
  ])('%s is a fault', (_what, row, column, value) => {
    expect(faultsOf(`${fluxHeader}\n1,B,900,3\n${row}\n`)).toEqual([[3, column, value, expect.any(String)]]);
  });

  it('negative counts beside a magnitude are only kept out of sight', () => {
    expect(faultsOf('frame,star,inst_mag,inst_err,flux\n1,A,12,0.1,-5\n')).toEqual([]);
  });

  it('counts on a frame without exposure time are a fault', () => {
    const frames = [loggedFrame({ number: 1, exposure_s: 0 })];
    expect(faultsOf(`${fluxHeader}\n1,A,500,3\n`, { frames })).toEqual([
      [2, 'flux', '500', 'The frame has no exposure time, so its counts have no magnitude.'],
    ]);
  });
});

describe('a fault of the whole row or file', () => {
  it('a wrong number of fields is reported with what the header has', () => {
    expect(faultsOf(`${header}\n1,A,1,1,12\n${good},extra\n# late comment\n`)).toEqual([
      [2, undefined, '1,A,1,1,12', 'This row has 5 fields, the header 6.'],
      [3, undefined, `${good},extra`, 'This row has 7 fields, the header 6.'],
      [4, undefined, '# late comment', 'This row has 1 field, the header 6.'],
    ]);
  });

  it('a star measured twice on one frame names both lines, whatever the spelling', () => {
    expect(faultsOf(`${header}\n${good}\n2,114-750,,,12.5,0.01\n1,114 750,,,12.6,0.01\n`)).toEqual([
      [4, 'Star', '114 750', 'This star was measured on this frame in line 2 already.'],
    ]);
  });

  it('a nameless row written twice names both lines', () => {
    const row = '1,,10.000001,20,12.5,0.01';
    expect(faultsOf(`${header}\n${row}\n2,,10.000001,20,12,0.01\n${row}\n`)).toEqual([
      [4, 'RA', '10.000001 20', 'This star was measured on this frame in line 2 already.'],
    ]);
  });

  it('missing columns are named once, with what would do instead', () => {
    const { faults } = checkTable('number,name,mag\n1,A,12\n2,B,13\n').result;
    expect(faults.map(({ line, message }) => [line, message])).toEqual([
      [1, 'There is no column that says which frame a row belongs to.'],
      [1, 'There is no column with the star’s name, nor two with its position.'],
      [1, 'There is no column with the instrumental magnitude or the counts.'],
      [1, 'There is no column with the standard error of the magnitude or of the counts.'],
    ]);
    expect(faults[2]?.remedy).toBe(
      'Name it inst_mag, or flux, or say on the upload page which column it is.',
    );
  });

  it('two columns of one name are a fault, whatever their case', () => {
    expect(faultsOf('frame,star,inst_mag,inst_err,STAR\n1,A,12,0.1,B\n')).toEqual([
      [1, 'STAR', expect.any(String), 'Two columns are called STAR.'],
    ]);
  });

  it('a mapping to a column that the file does not have is a fault', () => {
    expect(faultsOf(`${header}\n${good}\n`, { mapping: { fwhm: 'FWHM_IMAGE' } })).toEqual([
      [
        1,
        'FWHM_IMAGE',
        expect.any(String),
        'The column fwhm is to be read from FWHM_IMAGE, which this file does not have.',
      ],
    ]);
  });

  it('semicolons or tabs between the fields are named as such', () => {
    expect(faultsOf('frame;star;inst_mag;inst_err\n1;A;12;0.1\n')).toEqual([
      [1, undefined, expect.any(String), 'The fields are separated by semicolons.'],
    ]);
    expect(faultsOf('frame\tstar\tinst_mag\tinst_err\n')).toEqual([
      [1, undefined, expect.any(String), 'The fields are separated by tabs.'],
    ]);
  });

  it('a file without header or without rows is a fault', () => {
    expect(faultsOf('')).toEqual([
      [undefined, undefined, undefined, 'The table is empty: it has no header line.'],
    ]);
    expect(faultsOf('# only this\n\n')).toEqual([
      [undefined, undefined, undefined, expect.stringMatching(/empty/)],
    ]);
    expect(faultsOf(`${header}\n`)).toEqual([
      [undefined, undefined, undefined, 'The table has a header and no rows.'],
    ]);
  });

  it.each([
    ['gzip', [0x1f, 0x8b, 8, 0], /gzip/],
    ['a spreadsheet', [0x50, 0x4b, 3, 4], /spreadsheet/],
    ['UTF-16', [0xff, 0xfe, 0x66, 0], /UTF-16/],
    ['FITS', [...Buffer.from('SIMPLE  =                    T')], /FITS/],
  ])('%s is recognised and not read as text', (_what, bytes, message) => {
    expect(faultsOf(Uint8Array.from(bytes))).toEqual([
      [1, undefined, undefined, expect.stringMatching(message)],
    ]);
  });

  it('text that is not UTF-8 names line and column', () => {
    const bytes = Buffer.concat([
      Buffer.from(`${header}\n${good}\n1,B`),
      Buffer.from([0xe9]),
      Buffer.from(',1,1,12,0.1\n'),
    ]);
    expect(faultsOf(bytes)).toEqual([[3, 'Star', 'B\ufffd', 'This is not UTF-8 text.']]);
  });

  it('keeps the first thousand faults and counts them all', () => {
    const { result, rows } = checkTable(`${header}\n${'1,A,1,1,12,0\n'.repeat(2500)}`);
    expect(result.nFaults).toBe(2500);
    expect(result.faults).toHaveLength(1000);
    expect(result.faults.at(-1)?.line).toBe(1001);
    expect(result.rows).toBe(2500);
    expect(result.load).toBeNull();
    expect(rows).toEqual([]);
  });

  it('a fault in the very last row is enough for nothing to be loaded', () => {
    const rows = Array.from({ length: 300 }, (_, index) => `1,S${index},1,1,12,0.01`).join('\n');
    expect(checkTable(`${header}\n${rows}\n1,T,1,1,12,NaN\n`).result.load).toBeNull();
  });
});

describe('frames that a row names', () => {
  const frames = [
    loggedFrame({ number: 1, file: 'n1_0001.fits' }),
    loggedFrame({ number: 2, file: 'dir/N1_0002.fits.gz', band: 'B' }),
    loggedFrame({ number: 3, file: '4' }),
    loggedFrame({ number: 4 }),
    loggedFrame({ number: 5, type: 'flat' }),
    loggedFrame({ number: 6, band: null }),
    loggedFrame({ number: 7, file: 'a/x.fits' }),
    loggedFrame({ number: 8, file: 'b/X.fit' }),
  ];
  const row = (frame: string): string => `${frame},A,1,1,12,0.01`;

  it('are found by number, by file name, and by file name without folder, case and ending', () => {
    const names = ['1', '0002', 'a/x.fits'];
    const { result, rows } = checkTable(`${header}\n${names.map(row).join('\n')}\n`, { frames });
    expect(result.faults).toEqual([]);
    expect(rows.map((fields) => fields[1])).toEqual(['1001', '1002', '1007']);
    const loose = checkTable(`${header}\n${['n1_0001.fits', '/data/n1_0002.FITS'].map(row).join('\n')}\n`, {
      frames,
    });
    expect(loose.rows.map((fields) => fields[1])).toEqual(['1001', '1002']);
  });

  it.each([
    ['4', 'This is the number of one frame and the file name of another (frame 3).'],
    ['x.fits', 'This could be 2 frames: a/x.fits, b/X.fit.'],
    ['5', 'This frame is a flat: no star is measured on it.'],
    ['6', 'This frame has no band in the night log.'],
    ['n1_0003.fits', 'This frame is not in the night log.'],
  ])('%s is a fault with its reason', (frame, message) => {
    expect(faultsOf(`${header}\n${row(frame)}\n`, { frames })).toEqual([[2, 'Frame', frame, message]]);
  });

  it('may not contradict the log in band or exposure', () => {
    const table =
      'frame,star,inst_mag,inst_err,band,exposure\n1,A,12,0.1,B,40\n1,B,12,0.1,V,90\n1,C,12,0.1,V,40.3\n';
    expect(faultsOf(table)).toEqual([
      [2, 'band', 'B', 'This frame has the band V in the night log.'],
      [3, 'exposure', '90', 'This frame has an exposure of 40 s in the night log.'],
    ]);
  });

  it('an unknown band, type or start is a fault of its own', () => {
    const table = 'frame,star,inst_mag,inst_err,band,type,utc_start\n1,A,12,0.1,g,light,yesterday\n';
    expect(faultsOf(table)).toEqual([
      [2, 'utc_start', 'yesterday', 'This is not an instant.'],
      [2, 'band', 'g', 'This is no band of the standard system.'],
      [2, 'type', 'light', 'This is no type of frame.'],
    ]);
  });
});
