import { downloadCalibrated } from '@/lib/contracts/api/calibrated';
import {
  addConditions,
  correctCondition,
  listConditions,
  removeCondition,
} from '@/lib/contracts/api/condition';
import {
  correctFrame,
  getFrame,
  getNextFrame,
  listFrames,
  logFrames,
  removeFrame,
} from '@/lib/contracts/api/frame';
import { getHealth } from '@/lib/contracts/api/health';
import { cancelJob, getJob, getJobEvents, listJobs, retryJob } from '@/lib/contracts/api/job';
import { getMe } from '@/lib/contracts/api/me';
import * as sets from '@/lib/contracts/api/measurement-set';
import { getNight, listNights, openNight, patchNight } from '@/lib/contracts/api/night';
import { listObjects } from '@/lib/contracts/api/object-name';
import { getOpenApiDocument } from '@/lib/contracts/api/openapi';
import type { Operation } from '@/lib/contracts/api/operation';
import { listProgrammes } from '@/lib/contracts/api/programme';
import { addRemark, correctRemark, listRemarks, removeRemark } from '@/lib/contracts/api/remark';
import * as solutions from '@/lib/contracts/api/solution';
import { listStandards } from '@/lib/contracts/api/standard';
import { listTelescopes } from '@/lib/contracts/api/telescope';
import { addTimeLoss, correctTimeLoss, listTimeLosses, removeTimeLoss } from '@/lib/contracts/api/time-loss';
import { createToken } from '@/lib/contracts/api/token';
import type { ApiCall } from './api';
import { mark, type CallerName, type RightsWorld } from './rights-world';

/** What is sent, beside the caller's token. */
type Call = (world: RightsWorld, caller: CallerName) => ApiCall | Promise<ApiCall>;

/** Who may call an operation on the world's night, and what is in it. */
export interface RouteRights {
  readonly operation: Operation;
  /**
   * A sign for each of `callers`: + done, or refused for the state of the thing only (409); - forbidden (403); 0 not
   * found (404), and for nobody: not signed in (401).
   */
  readonly signs: string;
  readonly call: Call;
}

const row = (operation: Operation, signs: string, call: Call = () => ({})): RouteRights => ({
  operation,
  signs,
  call,
});

const inNight =
  (more: Omit<ApiCall, 'params'> = {}): Call =>
  ({ night }) => ({ params: { id: night }, ...more });
const ofFrame =
  (more: Omit<ApiCall, 'params'> = {}): Call =>
  ({ night, frame }) => ({ params: { id: night, frame }, ...more });
const ofCondition =
  (more: Omit<ApiCall, 'params'>): Call =>
  ({ night, condition }) => ({ params: { id: night, condition }, ...more });
const ofNewRemark =
  (more: Omit<ApiCall, 'params'>): Call =>
  async ({ night, newRemark }) => ({ params: { id: night, remark: await newRemark() }, ...more });
const ofNewTimeLoss =
  (more: Omit<ApiCall, 'params'>): Call =>
  async ({ night, newTimeLoss }) => ({ params: { id: night, loss: await newTimeLoss() }, ...more });
const ofSet =
  (more: Omit<ApiCall, 'params'> = {}): Call =>
  ({ set }) => ({ params: { id: set }, ...more });
const ofSolution =
  (more: Omit<ApiCall, 'params'> = {}): Call =>
  ({ solution }) => ({ params: { id: solution }, ...more });
const ofJob: Call = ({ job }) => ({ params: { id: job } });

const utc = '2026-11-03T22:00:00Z';
const reason = { reason: mark };

/** The rights of every operation. A new one gets its row here; a test finds the one that has none. */
export const routeRights: readonly RouteRights[] = [
  // For everybody, or for all who are signed in: a list shows each what they may see.
  //                    manager, photometrist, observer, otherObserver, pi, coinvestigator, outsider, nobody
  row(getHealth, '++++++++'),
  row(getOpenApiDocument, '++++++++'),
  row(createToken, '++++++++', (world, caller) => ({
    body: { ...world.credentials(caller), name: `${mark}: ${caller}` },
  })),
  row(getMe, '+++++++0'),
  row(listTelescopes, '+++++++0'),
  row(listProgrammes, '+++++++0'),
  row(listObjects, '+++++++0', () => ({ query: { q: 'SA' } })),
  row(listStandards, '+++++++0', () => ({ query: { field: 'SA 98' } })),
  row(listNights, '+++++++0'),
  row(listJobs, '+++++++0'),

  // The log.
  row(openNight, '++++---0', () => ({ body: { telescope: 'larkspur', date: utc.slice(0, 10) } })),
  row(getNight, '++++++00', inNight()),
  row(patchNight, '+++---00', inNight({ body: { state: 'closed' } })),
  row(listFrames, '++++++00', inNight()),
  row(logFrames, '+++---00', inNight({ body: { type: 'bias', object: '', utc_start: utc, exposure: 0 } })),
  row(getFrame, '+++++000', ofFrame()),
  row(correctFrame, '+++---00', ofFrame({ body: { exposure: 61, version: 1, ...reason } })),
  row(removeFrame, '+++---00', ofFrame({ query: reason })),
  row(getNextFrame, '++++++00', inNight()),
  row(listConditions, '++++++00', inNight()),
  row(addConditions, '+++---00', inNight({ body: { utc, cloud: 1 } })),
  row(correctCondition, '+++---00', ofCondition({ body: { cloud: 1 } })),
  row(removeCondition, '+++---00', ofCondition({ query: reason })),
  row(listRemarks, '++++++00', inNight()),
  row(addRemark, '+++---00', inNight({ body: { utc, text: mark } })),
  row(correctRemark, '+++---00', ofNewRemark({ body: { utc } })),
  row(removeRemark, '+++---00', ofNewRemark({ query: reason })),
  row(listTimeLosses, '++++++00', inNight()),
  row(addTimeLoss, '+++---00', inNight({ body: { cause: 'other', minutes: 1, comment: mark } })),
  row(correctTimeLoss, '+++---00', ofNewTimeLoss({ body: { minutes: 1 } })),
  row(removeTimeLoss, '+++---00', ofNewTimeLoss({ query: reason })),

  // Measurements: an observer of another night knows of the night, not of what was measured in it.
  row(sets.uploadMeasurements, '-++-+-00', ({ night, table }) => ({
    params: { id: night },
    body: table,
    headers: { 'content-type': 'text/csv' },
  })),
  row(sets.listMeasurementSets, '+++0++00', inNight()),
  row(sets.getMeasurementSet, '+++0++00', ofSet()),
  row(sets.listMeasurementFaults, '+++0++00', ofSet()),
  row(sets.getMeasurementOriginal, '+++0++00', ofSet()),
  row(sets.listMeasuredStars, '+++0++00', ofSet()),
  row(sets.listMeasurementRows, '+++0++00', ofSet()),
  row(sets.checkMeasurementSet, '-++0+-00', ofSet()),
  row(sets.refuseMeasurementSet, '-++0--00', ofSet({ body: reason })),
  row(sets.listColumnMappings, '++++++00', inNight()),
  row(
    sets.saveColumnMapping,
    '-++-+-00',
    inNight({
      body: { headers: [mark, 'Source', 'M', 'dM'], mapping: { frame: mark, inst_mag: 'M', inst_err: 'dM' } },
    }),
  ),

  // Solutions: a draft that has not been solved, so that nothing but the right decides. Withdrawn last.
  row(solutions.solveNight, '-++---00', inNight({ body: {} })),
  row(solutions.listSolutions, '+++0++00', inNight()),
  row(solutions.getSolution, '+++0++00', ofSolution()),
  row(solutions.listResiduals, '+++0++00', ofSolution()),
  row(
    solutions.changeExclusions,
    '-+-0--00',
    ofSolution({ body: { observations: ['aaaaaaaaaaaa.1'], ...reason } }),
  ),
  row(solutions.listSolutionComments, '+++0++00', ofSolution()),
  row(solutions.addSolutionComment, '+++0--00', ofSolution({ body: { text: mark } })),
  row(solutions.proposeSolution, '-+-0--00', ofSolution({ body: {} })),
  row(solutions.approveSolution, '-+-0--00', ofSolution({ body: {} })),
  row(solutions.transformAgain, '++-0--00', ofSolution()),
  row(solutions.withdrawSolution, '-+-0--00', ofSolution({ body: { comment: mark } })),

  row(downloadCalibrated, '+++0++00', ({ night, calibrated }) => ({
    params: { id: night },
    query: { solution: calibrated, format: 'csv' },
  })),

  // The observer's job that works on the draft: whoever may see a solution may follow what is done to it, no more.
  row(getJob, '+++0++00', ofJob),
  row(getJobEvents, '+++0++00', ofJob),
  row(cancelJob, '+-+0--00', ofJob),
  row(retryJob, '+--0--00', ofJob),
];
