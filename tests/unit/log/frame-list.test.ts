import { describe, expect, it } from 'vitest';
import { checkFrames, serverFaults } from '../../../app/(log)/nights/[id]/_components/check-frames';
import { printFrameList, readFrameList } from '../../../app/(log)/nights/[id]/_components/frame-list';
import { aFrame, night, telescope } from './a-night';

const context = { night, telescope, frames: [aFrame({ number: 41, file: 'a.fits' })] };

describe('a pasted table of frames', () => {
  it.each([
    ['commas', 'type,object,band,start,exposure\nstandard,SA 95,B,23:41,40'],
    ['semicolons', 'type;object;band;start;exposure\nstandard;SA 95;B;23:41;40'],
    ['tabs', 'type\tobject\tband\tstart\texposure\nstandard\tSA 95\tB\t23:41\t40'],
    ['other names', '\uFEFFTYPE,OBJECT,FILTER,UTC_START,EXPTIME\nstandard,SA 95,B,23:41,40\n\n'],
    [
      'comments before it',
      '# from the spreadsheet\ntype,object,band,start,exposure\nstandard,SA 95,B,23:41,40',
    ],
  ])('is read with %s', (_how, text) => {
    const { lines, problems } = readFrameList(text);
    expect(problems).toEqual([]);
    expect(lines).toHaveLength(1);
    expect(lines[0]?.line).toMatchObject({
      type: 'standard',
      object: 'SA 95',
      band: 'B',
      start: '23:41',
      exposure: '40',
    });
  });

  it('without a header line has the columns of the log', () => {
    const { lines } = readFrameList('48,standard,SA 95,B,23:41:05,40,thin cloud');
    expect(lines[0]).toMatchObject({
      lineNumber: 1,
      line: { number: '48', exposure: '40', comment: 'thin cloud' },
    });
  });

  it('says which columns it leaves out, and counts lines as an editor does', () => {
    const { lines, problems } = readFrameList('type,moonage,start\nbias,3,15:00\n\nbias,4,15:01');
    expect(problems).toEqual(['The column “moonage” is not known, and is left out.']);
    expect(lines.map(({ lineNumber }) => lineNumber)).toEqual([2, 4]);
  });

  it('comes back the same from its printed form, commas and quotes included', () => {
    const { lines } = readFrameList(
      'type,object,start,exposure,comment\ntarget,"Thistle 3, west",23:41,40,"so-called ""dark"" sky"',
    );
    const again = readFrameList(printFrameList(lines.map(({ line }) => line)));
    expect(again.lines.map(({ line }) => line)).toEqual(lines.map(({ line }) => line));
  });

  it('is empty when nothing is pasted', () => {
    expect(readFrameList(' \n')).toEqual({ lines: [], problems: [] });
  });
});

describe('the check of a list', () => {
  const check = (text: string) => checkFrames(readFrameList(text).lines, context);

  it('finds every fault on every line', () => {
    const checked = check(
      'number,type,band,start,exposure\n50,bias,,15:00,0\n51,flat,Q,25:00,x\n52,bias,,,0',
    );
    expect(checked.map(({ input }) => input !== null)).toEqual([true, false, false]);
    expect(Object.keys(checked[1]?.faults ?? {}).toSorted()).toEqual(['band', 'exposure', 'start']);
    expect(checked[2]?.faults).toEqual({ start: 'is needed' });
  });

  it('finds numbers and files that are in the log or twice in the list', () => {
    const checked = check(
      'number,type,start,file\n41,bias,15:00,b.fits\n50,bias,15:01,A.fits\n50,bias,15:02,b.fits',
    );
    expect(checked.map(({ faults }) => faults)).toEqual([
      { number: 'is the number of a frame in the log' },
      { file: 'is the file of frame 41 in the log' },
      { number: 'is the number on line 3 as well', file: 'is the file on line 2 as well' },
    ]);
  });

  it('puts the server’s faults on the lines that they are about', () => {
    const { lines } = readFrameList('type,start\nbias,15:00\nbias,15:01');
    expect(
      serverFaults(
        [
          { path: '1.number', message: 'is taken' },
          { path: '', message: 'is too long' },
        ],
        lines,
      ),
    ).toEqual([
      { path: '1.number', line: 3, column: 'number', message: 'is taken' },
      { path: '', message: 'is too long' },
    ]);
  });
});
