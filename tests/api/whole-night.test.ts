import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest';
import { demoToken } from '../support/api';
import { expectTruth, readCalibrated, walkNight, type WalkNight } from '../support/walk-night';

const run = promisify(execFile);
const script = path.resolve('public/examples/whole-night.sh');

let folder: string;
let night: WalkNight;

beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'evenfall-walk-'));
  night = await walkNight('2026-10-15', 20261015);
  await writeFile(path.join(folder, 'frames.json'), JSON.stringify(night.frames));
  await writeFile(path.join(folder, 'standards.csv'), night.standards);
  await writeFile(path.join(folder, 'targets.csv'), night.targets);
});
afterAll(() => rm(folder, { recursive: true, force: true }));

describe('the example script of the interface', () => {
  it('takes a night from its frames to calibrated magnitudes that agree with the truth of the simulation', async () => {
    const { stdout } = await run(script, [folder], {
      env: {
        ...process.env,
        EVENFALL_URL: inject('baseUrl'),
        TELESCOPE: 'larkspur',
        NIGHT_DATE: night.date,
        OBSERVER: await demoToken('observer'),
        PHOTOMETRIST: await demoToken('photometrist'),
        APPROVER: await demoToken('photometrist2'),
        INVESTIGATOR: await demoToken('pi'),
      },
    });
    expect(stdout).toContain('The fit is determined and suggests: photometric.');

    expectTruth(readCalibrated(await readFile(path.join(folder, 'calibrated.csv'), 'utf8')), night);
  });
});
