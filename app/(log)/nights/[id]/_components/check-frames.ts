import type { Frame, FrameInput } from '@/lib/contracts/api/frame';
import type { Issue } from '@/lib/faults/fault';
import type { NightLog } from '@/lib/contracts/night-log';
import type { ListedLine } from './frame-list';
import { readLine, type LineFaults } from './frame-line';

/** A line of a list, read: what would be logged, or what is wrong with it. */
export interface CheckedLine extends ListedLine {
  readonly input: FrameInput | null;
  readonly faults: LineFaults;
}

interface CheckContext {
  readonly night: NightLog['night'];
  readonly telescope: NightLog['telescope'];
  readonly frames: readonly Frame[];
}

/** Numbers and files that the log has, or that stand twice in the list. */
function clashes(frames: readonly Frame[]) {
  const numbers = new Map(
    frames.map(({ number }) => [String(number), 'is the number of a frame in the log']),
  );
  const files = new Map<string, string>(
    frames.flatMap(({ file, number }) =>
      file === null ? [] : [[file.toLowerCase(), `is the file of frame ${number} in the log`] as const],
    ),
  );
  return ({ line, lineNumber }: ListedLine): LineFaults => {
    const [number, file] = [line.number, line.file.toLowerCase()];
    const found = {
      ...(numbers.has(number) ? { number: numbers.get(number) ?? '' } : {}),
      ...(files.has(file) ? { file: files.get(file) ?? '' } : {}),
    };
    if (number !== '') numbers.set(number, `is the number on line ${lineNumber} as well`);
    if (file !== '') files.set(file, `is the file on line ${lineNumber} as well`);
    return found;
  };
}

/** Reads every line of a list by the rules of the log; all that is wrong, line by line. */
export function checkFrames(
  lines: readonly ListedLine[],
  { night, telescope, frames }: CheckContext,
): readonly CheckedLine[] {
  const clash = clashes(frames);
  return lines.map((listed) => {
    const read = readLine(listed.line, { night, telescope, now: null });
    const faults: LineFaults = {
      ...(read.ok ? {} : read.faults),
      ...clash(listed),
    };
    const isGood = read.ok && Object.keys(faults).length === 0;
    return { ...listed, input: isGood ? read.input : null, faults };
  });
}

/** Faults that the server found in a list, on the lines that they are about. Its paths read `12.band`. */
export function serverFaults(issues: readonly Issue[], lines: readonly ListedLine[]): readonly Issue[] {
  return issues.map(({ path, message }) => {
    const [index = '', column = ''] = path.split('.');
    const line = /^\d+$/.test(index) ? lines[Number(index)]?.lineNumber : undefined;
    return line === undefined ? { path, message } : { path, line, column, message };
  });
}
