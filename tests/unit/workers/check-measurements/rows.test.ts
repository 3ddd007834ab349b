import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkTable, loggedFrame } from '@/tests/support/table-order';

const night = Date.UTC(2026, 10, 3);

describe('rows that are to be loaded', () => {
  it('hold the values of the table in the order of the database, NULL where there is none', () => {
    const { rows, stars, flags, result } = checkTable(
      '# reduced twice\nFRAME,star,ra,dec,inst_mag,inst_err,x,y,fwhm,sky,peak,flag,remark\n' +
        '1,114-750,340.436,1.21,12.5,0.01,1020.5,33,2.4,180,41000,edge,kept nowhere\n' +
        '2,Other,,,-7.25,0.002,,,,,,,\n',
    );
    expect(result.nFaults).toBe(0);
    expect(result.comments).toBe('reduced twice');
    expect(result.columns).toMatchObject({ frame: 'FRAME', inst_mag: 'inst_mag', flag: 'flag' });
    expect(rows).toEqual([
      ['1', '1001', '1', '12.5', '0.01', '340.436', '1.21', '1020.5', '33', '2.4', '180', '41000', '1'],
      ['2', '1002', '2', '-7.25', '0.002', ...Array<string>(8).fill('\\N')],
    ]);
    expect(stars).toEqual([
      [
        '1',
        '114-750',
        '340.436',
        '1.21',
        '1',
        '3',
        '500',
        'name',
        expect.stringMatching(/^0(\.0+\d*)?$|e-/),
        '',
      ],
      [
        '2',
        'Other',
        '\\N',
        '\\N',
        '1',
        '4',
        '\\N',
        '\\N',
        '\\N',
        'No standard has this name, and the table gives no position.',
      ],
    ]);
    expect(flags).toEqual([['1', 'edge']]);
    expect(result.load).toMatchObject({
      matchedRows: 1,
      newFrames: [],
      usedFrames: [
        { frame: 1001, rows: 1 },
        { frame: 1002, rows: 1 },
      ],
    });
  });

  it('read other headers by their mapping', () => {
    const mapping = { frame: 'image', inst_mag: 'MAGNITUDE', inst_err: 'err' };
    const { rows, result } = checkTable('IMAGE,star,magnitude,Err,inst_mag\n1,A,12,0.1,77\n', { mapping });
    expect(result.faults).toEqual([]);
    expect(rows[0]?.slice(3, 5)).toEqual(['12', '0.1']);
    expect(result.columns).toEqual({ frame: 'IMAGE', star: 'star', inst_mag: 'magnitude', inst_err: 'Err' });
  });

  it('read remembered headers by the mapping that somebody saved for them, unless the uploader gives another', () => {
    const remembered = [
      {
        headers: ['Image', 'Name', 'M', 'E', 'N'],
        mapping: { frame: 'image', star: 'name', inst_mag: 'm', inst_err: 'e' },
      },
    ];
    const content = 'IMAGE,name,m,e,n\n1,A,12,0.1,0.2\n';
    expect(checkTable(content, { remembered }).rows[0]?.slice(3, 5)).toEqual(['12', '0.1']);
    const mapping = { frame: 'image', star: 'name', inst_mag: 'm', inst_err: 'n' };
    expect(checkTable(content, { remembered, mapping }).rows[0]?.slice(3, 5)).toEqual(['12', '0.2']);
    expect(checkTable(`x,${content}`, { remembered }).result.nFaults).toBeGreaterThan(0);
  });

  it('turn counts into magnitudes with the exposure of the frame', () => {
    const { rows } = checkTable('frame,star,flux,flux_err\n1,A,4000,40\n');
    expect(Number(rows[0]?.[3])).toBe(-5);
    expect(Math.abs(Number(rows[0]?.[4]) - 0.010857362)).toBeLessThan(1e-9);
  });

  it('take sexagesimal positions', () => {
    const { rows } = checkTable('frame,ra,dec,inst_mag,inst_err\n1,22:41:44.64,-00:12:36,12,0.1\n');
    expect(rows[0]?.slice(5, 7).map(Number)).toEqual([340.436, -0.21]);
  });

  it('never carry NaN or infinity, whatever numbers a table holds', () => {
    const cell = fc.oneof(
      fc.double(),
      fc.constantFrom('', 'nan', 'inf', '-', '1e400', '0x1'),
      fc.string({ maxLength: 4 }),
    );
    const text = (value: string | number): string => `"${String(value).replaceAll('"', '""')}"`;
    fc.assert(
      fc.property(
        fc.array(fc.array(cell, { minLength: 9, maxLength: 9 }), { minLength: 1, maxLength: 4 }),
        (drawn) => {
          const lines = drawn.map((values, index) => [1, `S${index}`, ...values].map(text).join(','));
          const table = `frame,star,inst_mag,inst_err,flux,flux_err,x,y,fwhm,sky,peak\n${lines.join('\n')}\n`;
          const { rows, result } = checkTable(table);
          expect(rows.length === 0).toBe(result.nFaults > 0);
          for (const fields of rows) {
            const numbers = fields.filter((field) => field !== '\\N').map(Number);
            expect(numbers.every(Number.isFinite)).toBe(true);
          }
        },
      ),
      { numRuns: 200 },
    );
  });

  it('are the same whatever the size of the pieces in which the file came', () => {
    const lines = Array.from(
      { length: 40 },
      (_, index) => `${(index % 2) + 1},"S ""${index >> 1}""",${index}.5,0.01`,
    );
    const content = `\ufeff# é\r\nframe,star,inst_mag,inst_err\r\n${lines.join('\r\n')}\r\n`;
    const whole = checkTable(content);
    expect(whole.rows).toHaveLength(40);
    for (const size of [1, 7, 64])
      expect(checkTable(content, {}, size)).toMatchObject({ rows: whole.rows, stars: whole.stars });
  });
});

describe('the stars of a table', () => {
  const near = [{ name: 'P', ra: 359.9999, dec: 0 }];

  it('one name in several spellings is one star', () => {
    const { stars } = checkTable('frame,star,inst_mag,inst_err\n1,SA 92-259,12,0.1\n2,sa92 259,12,0.1\n', {});
    expect(stars.map((fields) => [fields[1], fields[4]])).toEqual([['SA 92-259', '2']]);
  });

  it('nameless rows of several frames are one star within the tolerance, across right ascension 0 too', () => {
    const table = 'frame,ra,dec,inst_mag,inst_err\n1,359.9999,0,12,0.1\n2,0.0001,0,12,0.1\n';
    expect(checkTable(table, { stars: near }).stars).toEqual([
      ['1', '', '359.9999', '0', '2', '2', '500', 'position', '0', ''],
    ]);
  });

  it('two nameless rows of one frame are two stars, however near', () => {
    const table =
      'frame,ra,dec,inst_mag,inst_err\n1,10,0,12,0.1\n1,10.0002,0,13,0.1\n2,10.0002,0,13,0.1\n2,10,0,12,0.1\n';
    const { rows } = checkTable(table);
    expect(rows.map((fields) => fields[2])).toEqual(['1', '2', '2', '1']);
  });

  it('two stars of one frame cannot be one standard: the nearer one is it', () => {
    const table =
      'frame,star,ra,dec,inst_mag,inst_err\n1,a,0.0002,0,12,0.1\n1,b,359.99995,0,12,0.1\n2,a,0.0002,0,12,0.1\n';
    const { stars, result } = checkTable(table, { stars: near });
    expect(stars.map((fields) => [fields[1], fields[7], fields[9]])).toEqual([
      ['a', '\\N', 'On one frame two stars of the table match P; the other lies nearer, at 0.2″.'],
      ['b', 'position', ''],
    ]);
    expect(result.load?.matchedRows).toBe(1);
  });

  it('the name counts before the position', () => {
    const table = 'frame,star,ra,dec,inst_mag,inst_err\n1,b,359.9999,0,12,0.1\n1,P,0.0002,0,12,0.1\n';
    expect(checkTable(table, { stars: near }).stars.map((fields) => fields[7])).toEqual(['\\N', 'name']);
  });

  it('of a table of targets are not looked for among the standards', () => {
    const { stars, result } = checkTable('frame,star,inst_mag,inst_err\n1,114-750,12,0.1\n', {
      kind: 'target',
    });
    expect(stars).toEqual([['1', '114-750', '\\N', '\\N', '1', '2', '\\N', '\\N', '\\N', '']]);
    expect(result.load?.matchedRows).toBe(0);
  });
});

describe('frames that the log does not have', () => {
  const header = 'frame,star,ra,dec,inst_mag,inst_err,utc_start,exposure,band,type';
  const start = '2026-11-03T21:00:00Z';

  it('are created from start, exposure and band, with the middle of their stars', () => {
    const { result, rows } = checkTable(
      `${header}\n47,114-750,340.436,1.21,12,0.1,${start},60,V,\n47,x,340.438,1.21,12,0.1,,,,\nlk_9.fits,114-750,340.436,1.21,12,0.1,2026-11-03 21:05:00.5,30,B,target\n`,
    );
    expect(result.faults).toEqual([]);
    expect(rows.map((fields) => fields[1])).toEqual(['-1', '-1', '-2']);
    expect(result.load?.newFrames).toEqual([
      {
        number: 47,
        file: null,
        type: 'standard',
        band: 'V',
        utcStart: night + 21 * 3_600_000,
        exposure_s: 60,
        place: {
          object: 'SA 114',
          field: 'SA 114',
          programmeId: null,
          ra: expect.closeTo(340.437, 6) as number,
          decl: expect.closeTo(1.21, 6) as number,
        },
        geometry: expect.objectContaining({
          utcMid: night + 21 * 3_600_000 + 30_000,
          airmass: expect.closeTo(1.1215, 4) as number,
        }) as object,
      },
      expect.objectContaining({
        number: null,
        file: 'lk_9.fits',
        type: 'target',
        band: 'B',
        utcStart: night + 75_900_500,
      }),
    ]);
  });

  it('of a mixed table are of standards where one was found on them', () => {
    const table = `${header}\n8,114-750,,,12,0.1,${start},60,V,\n9,x,10,10,12,0.1,2026-11-03T22:00:00Z,60,V,\n`;
    expect(checkTable(table, { kind: 'mixed' }).result.load?.newFrames.map(({ type }) => type)).toEqual([
      'standard',
      'target',
    ]);
  });

  it('convert counts with their own exposure', () => {
    const table = `frame,star,flux,flux_err,utc_start,exposure,band\n8,A,6000,60,${start},60,V\n`;
    expect(Number(checkTable(table).rows[0]?.[3])).toBe(-5);
  });

  it.each([
    [
      'an exposure outside the night',
      `8,A,,,12,0.1,2026-11-05T21:00:00Z,60,V,`,
      'utc_start',
      /runs from noon to noon/,
    ],
    ['a row that says too little', `8,A,,,12,0.1,${start},,V,`, 'frame', /not in the night log/],
    ['a flat', `8,A,,,12,0.1,${start},60,V,flat`, 'type', /No star is measured on a flat/],
    ['frame 0', `0,A,,,12,0.1,${start},60,V,`, 'frame', /count from 1/],
    [
      'an exposure that the log has under another name',
      `n8.fits,A,,,12,0.1,2026-11-03T20:01:01Z,40,V,`,
      'frame',
      /began when frame 1 in the log did/,
    ],
  ])('%s is a fault', (_what, row, column, message) => {
    const { faults } = checkTable(`${header}\n${row}\n`).result;
    expect(faults.map((fault) => [fault.line, fault.column])).toEqual([[2, column]]);
    expect(faults[0]?.message).toMatch(message);
  });

  it('must be the same in all their rows', () => {
    const table = `${header}\n8,A,,,12,0.1,${start},60,V,\n8,B,,,12,0.1,${start},90,B,target\n`;
    expect(
      checkTable(table).result.faults.map(({ line, column, message }) => [line, column, message]),
    ).toEqual([
      [3, 'band', 'This frame has the band V in line 2.'],
      [3, 'exposure', 'This frame has an exposure of 60 s in line 2.'],
      [3, 'type', 'This frame has no type in line 2.'],
    ]);
  });

  it('are not created in a night that is closed', () => {
    const { faults } = checkTable(`${header}\n8,A,,,12,0.1,${start},60,V,\n`, { isOpen: false }).result;
    expect(faults.map(({ line, column, message }) => [line, column, message])).toEqual([
      [2, 'frame', 'This frame is not in the log, and the night is closed.'],
    ]);
    expect(
      checkTable(`${header}\n1,A,,,12,0.1,,,,\n`, { isOpen: false, frames: [loggedFrame({ number: 1 })] })
        .rows,
    ).toHaveLength(1);
  });
});
