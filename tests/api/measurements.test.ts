import { createHash } from 'node:crypto';
import { existsSync, readdirSync } from 'node:fs';
import { request as httpRequest } from 'node:http';
import path from 'node:path';
import request, { type Response } from 'supertest';
import { beforeAll, describe, expect, inject, it } from 'vitest';
import { getJob, type Job } from '@/lib/contracts/api/job';
import {
  checkMeasurementSet,
  getMeasurementOriginal,
  getMeasurementSet,
  listColumnMappings,
  listMeasuredStars,
  listMeasurementFaults,
  listMeasurementRows,
  listMeasurementSets,
  refuseMeasurementSet,
  saveColumnMapping,
  type MeasuredStar,
  type MeasurementFault,
  type MeasurementRow,
  type MeasurementSet,
  type Queued,
} from '@/lib/contracts/api/measurement-set';
import { logFrames } from '@/lib/contracts/api/frame';
import { openNight, type Night } from '@/lib/contracts/api/night';
import type { List } from '@/lib/contracts/common';
import { callApi, demoToken } from '@/tests/support/api';

let observer: string;
let photometrist: string;
let pi: string;
/** Far from the demo's nights and from those of other tests. */
let day = Date.UTC(2032, 2, 1);

beforeAll(async () => {
  observer = await demoToken('observer');
  photometrist = await demoToken('photometrist');
  pi = await demoToken('pi');
});

const bodyOf = <T>(answer: Response): T => answer.body as T;

async function freshNight(): Promise<Night> {
  day += 86_400_000;
  const date = new Date(day).toISOString().slice(0, 10);
  const opened = await callApi(openNight, { token: observer, body: { telescope: 'larkspur', date } });
  const night = bodyOf<Night>(opened);
  const frame = (band: string) => ({
    type: 'standard',
    object: 'SA 98',
    band,
    utc_start: `${date}T23:00:00Z`,
    exposure: 30,
  });
  await callApi(logFrames, { token: observer, params: { id: night.id }, body: [frame('V'), frame('B')] });
  return night;
}

interface Upload {
  readonly token?: string;
  readonly query?: Readonly<Record<string, string>>;
  readonly type?: string;
  readonly key?: string;
}
const post = (night: Night, { token = observer, query = {}, type = 'text/csv', key }: Upload = {}) => {
  const sent = request(inject('baseUrl'))
    .post(`/api/v1/nights/${night.id}/measurements`)
    .query(query)
    .set('authorization', `Bearer ${token}`);
  if (type !== '') sent.set('content-type', type);
  return key === undefined ? sent : sent.set('idempotency-key', key);
};
const table = '# one\nframe,star,inst_mag,inst_err\n1,98 185,-7,0.01\n2,98 185,-6,0.01\n1,X,-5,0.02\n';
const faulty = 'frame,star,inst_mag,inst_err\n1,=1+1,NaN,0.01\n1,B,-7,-1\n3,C,-7,0.1\n';

async function untilEnded(job: string): Promise<Job> {
  const end = Date.now() + 20_000;
  for (;;) {
    const now = bodyOf<Job>(await callApi(getJob, { token: observer, params: { id: job } }));
    if (now.state === 'done' || now.state === 'failed' || Date.now() > end) return now;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}
async function taken(night: Night, content: string, upload: Upload = {}): Promise<MeasurementSet> {
  const answer = await post(night, upload).send(content);
  expect(answer.status, answer.text).toBe(202);
  const { set, job } = bodyOf<Queued>(answer);
  expect(await untilEnded(job)).toMatchObject({ state: 'done', result: { set } });
  return bodyOf<MeasurementSet>(await callApi(getMeasurementSet, { token: observer, params: { id: set } }));
}

describe('a table over HTTP', () => {
  it('is taken, checked by a job, matched, and given back byte for byte', async () => {
    const night = await freshNight();
    const set = await taken(night, table, {
      query: { kind: 'standard', name: 'First', tolerance: '3', file: 'a/b é.csv' },
    });
    expect(set).toMatchObject({
      state: 'matched',
      name: 'First',
      kind: 'standard',
      tolerance: 3,
      file_name: 'b é.csv',
      rows: 3,
      matched_rows: 2,
      comments: 'one',
      sha256: createHash('sha256').update(table).digest('hex'),
      is_whole: true,
    });
    const params = { id: set.id };
    const original = await callApi(getMeasurementOriginal, { token: observer, params });
    expect((original.body as Buffer).toString('utf8')).toBe(table);
    expect(original.headers['content-disposition']).toBe(
      `attachment; filename="b _.csv"; filename*=UTF-8''b%20%C3%A9.csv`,
    );
    const rows = bodyOf<List<MeasurementRow>>(
      await callApi(listMeasurementRows, { token: observer, params, query: { limit: 2 } }),
    );
    expect(
      rows.items.map(({ row, frame, band, star, standard }) => [row, frame, band, star, standard]),
    ).toEqual([
      [1, 1, 'V', '98 185', '98 185'],
      [2, 2, 'B', '98 185', '98 185'],
    ]);
    const more = await callApi(listMeasurementRows, {
      token: observer,
      params,
      query: { after: rows.next ?? '' },
    });
    expect(bodyOf<List<MeasurementRow>>(more)).toMatchObject({
      items: [{ row: 3, star: 'X', standard: null }],
      next: null,
    });
    const stars = await callApi(listMeasuredStars, { token: observer, params, query: { matched: 'yes' } });
    expect(bodyOf<List<MeasuredStar>>(stars).items).toMatchObject([
      {
        name: '98 185',
        rows: 2,
        first_line: 3,
        matched_by: 'name',
        standard: { name: '98 185', field: 'SA 98' },
      },
    ]);
    const list = await callApi(listMeasurementSets, { token: observer, params: { id: night.id } });
    expect(bodyOf<List<MeasurementSet>>(list).items.map(({ id }) => id)).toEqual([set.id]);
  });

  it('comes as the one file of a form too, without being held in memory', async () => {
    const night = await freshNight();
    const answer = await post(night, { type: '' })
      .field('note', 'ignored')
      .attach('file', Buffer.from(table), { filename: 'night.csv', contentType: 'text/csv' });
    expect(answer.status, answer.text).toBe(202);
    const { set, job } = bodyOf<Queued>(answer);
    await untilEnded(job);
    const shown = await callApi(getMeasurementSet, { token: observer, params: { id: set } });
    expect(bodyOf<MeasurementSet>(shown)).toMatchObject({
      state: 'matched',
      file_name: 'night.csv',
      name: 'night.csv',
      rows: 3,
    });
  });

  it('that is faulty is refused with every fault, as a list and as a table safe in a spreadsheet', async () => {
    const night = await freshNight();
    const set = await taken(night, faulty);
    expect(set).toMatchObject({ state: 'refused', rows: 3, faults: 3, matched_rows: 0 });
    const params = { id: set.id };
    const faults = await callApi(listMeasurementFaults, { token: observer, params });
    expect(bodyOf<List<MeasurementFault>>(faults)).toMatchObject({
      items: [
        { line: 2, column: 'inst_mag', value: 'NaN' },
        { line: 3, column: 'inst_err', value: '-1' },
        { line: 4, column: 'frame', value: '3' },
      ],
      next: null,
    });
    const csv = await callApi(listMeasurementFaults, { token: observer, params, query: { format: 'csv' } });
    expect(csv.headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(csv.headers['content-disposition']).toContain('measurements-faults.csv');
    expect(csv.text.split('\r\n').slice(0, 3)).toEqual([
      'line,column,value,fault,remedy',
      expect.stringMatching(/^2,inst_mag,NaN,/),
      expect.stringMatching(/^3,inst_err,'-1,A standard error is greater than 0\.,/),
    ]);
  });

  it('with the same bytes a second time is a conflict that names the first', async () => {
    const night = await freshNight();
    const set = await taken(night, table);
    const again = await post(night).send(table);
    expect(again.status).toBe(409);
    expect(bodyOf<{ errors: readonly object[] }>(again).errors).toMatchObject([
      { path: 'set', value: set.id },
    ]);
  });

  it('sent again with its Idempotency-Key gets the first answer; other bytes under the key are refused', async () => {
    const night = await freshNight();
    const key = `upload-${night.id}`;
    const first = await post(night, { key }).send(table);
    const second = await post(night, { key }).send(table);
    expect(second.status).toBe(202);
    expect(second.body).toEqual(first.body);
    expect((await post(night, { key }).send(`${table}1,Y,-5,0.1\n`)).status).toBe(422);
  });

  it('that was taken can be taken back, once, by who uploaded it', async () => {
    const night = await freshNight();
    const set = await taken(night, table);
    const params = { id: set.id };
    const noReason = await callApi(refuseMeasurementSet, { token: observer, params, body: { reason: '' } });
    expect(noReason.status).toBe(400);
    const done = await callApi(refuseMeasurementSet, {
      token: observer,
      params,
      body: { reason: 'wrong file' },
    });
    expect(bodyOf<MeasurementSet>(done)).toMatchObject({ state: 'refused', may_refuse: false });
    expect(
      (await callApi(refuseMeasurementSet, { token: observer, params, body: { reason: 'again' } })).status,
    ).toBe(409);
    expect((await callApi(checkMeasurementSet, { token: observer, params })).status).toBe(409);
  });
});

describe('what is refused before it is kept', () => {
  it.each([
    ['an empty body', '', 'text/csv', 400],
    ['a body that says it is something else', table, 'application/json', 415],
    ['a body in another encoding', table, 'text/csv; charset=iso-8859-1', 415],
    ['a FITS table', 'SIMPLE  =', 'application/fits', 415],
    ['a form without its boundary', table, 'multipart/form-data', 400],
    [
      'a form that breaks off',
      '--x\r\ncontent-disposition: form-data; name="file"; filename="a"\r\n\r\nframe',
      'multipart/form-data; boundary=x',
      400,
    ],
    [
      'a form without the file',
      '--x\r\ncontent-disposition: form-data; name="other"\r\n\r\n1\r\n--x--\r\n',
      'multipart/form-data; boundary=x',
      400,
    ],
  ])('%s', async (...[, body, type, status]) => {
    const answer = await post(await freshNight(), { type }).send(body);
    expect(answer.status, answer.text).toBe(status);
    expect(answer.headers['content-type']).toContain('application/problem+json');
  });

  it('a form with two files', async () => {
    const answer = await post(await freshNight(), { type: '' })
      .attach('file', Buffer.from(table), 'a.csv')
      .attach('file', Buffer.from(table), 'b.csv');
    expect(answer.status, answer.text).toBe(400);
  });

  it.each([
    [{ kind: 'everything' }, 'kind'],
    [{ tolerance: '0' }, 'tolerance'],
    [{ tolerance: '61' }, 'tolerance'],
    [{ mapping: '{' }, 'mapping'],
    [{ mapping: '{"brightness": "M"}' }, 'mapping'],
  ])('a query such as %j', async (query, field) => {
    const answer = await post(await freshNight(), { query }).send(table);
    expect(answer.status).toBe(400);
    expect(bodyOf<{ errors: readonly { path: string }[] }>(answer).errors[0]?.path).toContain(field);
  });

  it('who may not upload, and who is nobody', async () => {
    const night = await freshNight();
    expect((await post(night, { token: await demoToken('manager') }).send(table)).status).toBe(403);
    expect((await post(night, { token: pi }).send(table)).status).toBe(404);
    expect((await post(night, { token: 'no such token' }).send(table)).status).toBe(401);
    expect((await post(night, { token: await demoToken('observer', ['read']) }).send(table)).status).toBe(
      403,
    );
  });

  it('a file that announces more than the limit, before it is sent', async () => {
    const night = await freshNight();
    const { hostname, port } = new URL(inject('baseUrl'));
    const status = await new Promise<number | undefined>((resolve, reject) => {
      const sending = httpRequest({
        hostname,
        port,
        method: 'POST',
        path: `/api/v1/nights/${night.id}/measurements`,
        headers: {
          authorization: `Bearer ${observer}`,
          'content-type': 'text/csv',
          'content-length': 2 ** 31,
        },
      });
      sending.on('response', (answer) => {
        resolve(answer.statusCode);
        sending.destroy();
      });
      sending.on('error', reject);
      sending.write('frame');
    });
    expect(status).toBe(413);
  });

  it('an upload that breaks off leaves no file behind', async () => {
    const night = await freshNight();
    const incoming = path.join(inject('servedDataFolder'), 'originals', 'incoming');
    const { hostname, port } = new URL(inject('baseUrl'));
    await new Promise<void>((resolve) => {
      const sending = httpRequest({
        hostname,
        port,
        method: 'POST',
        path: `/api/v1/nights/${night.id}/measurements`,
        headers: {
          authorization: `Bearer ${observer}`,
          'content-type': 'text/csv',
          'content-length': 1_000_000,
        },
      });
      sending.on('error', () => resolve());
      sending.write('x'.repeat(100_000));
      const files = () => (existsSync(incoming) ? readdirSync(incoming) : []);
      const timer = setInterval(() => {
        if (files().length === 0) return;
        clearInterval(timer);
        sending.destroy(new Error('gone'));
      }, 10);
    });
    await expect.poll(() => readdirSync(incoming), { timeout: 5_000 }).toEqual([]);
    const list = await callApi(listMeasurementSets, { token: observer, params: { id: night.id } });
    expect(bodyOf<List<MeasurementSet>>(list).items).toEqual([]);
  });
});

describe('column mappings over HTTP', () => {
  it('are saved, listed, and read the next table', async () => {
    const night = await freshNight();
    const headers = [`Frame of ${night.id}`, 'Source', 'M', 'dM'];
    const mapping = { frame: headers[0], star: 'Source', inst_mag: 'M', inst_err: 'dM' };
    const params = { id: night.id };
    const saved = await callApi(saveColumnMapping, { token: observer, params, body: { headers, mapping } });
    expect(saved.body).toMatchObject({ headers, mapping });
    const listed = await callApi(listColumnMappings, { token: photometrist, params });
    expect(bodyOf<List<object>>(listed).items).toContainEqual(saved.body);
    const set = await taken(night, `${headers.join(',')}\n1,98 185,-7,0.01\n`);
    expect(set).toMatchObject({ state: 'matched', matched_rows: 1, mapping });
    const wrong = await callApi(saveColumnMapping, {
      token: observer,
      params,
      body: { headers, mapping: { frame: 'no' } },
    });
    expect(wrong.status).toBe(400);
  });
});

describe('sets of others', () => {
  it('are not found by investigators without a frame in the night', async () => {
    const set = await taken(await freshNight(), table);
    const params = { id: set.id };
    for (const operation of [
      getMeasurementSet,
      listMeasurementFaults,
      getMeasurementOriginal,
      listMeasuredStars,
      listMeasurementRows,
      checkMeasurementSet,
    ]) {
      expect((await callApi(operation, { token: pi, params })).status, operation.id).toBe(404);
      expect((await callApi(operation, { params })).status, operation.id).toBe(401);
    }
    const refuse = { token: pi, params, body: { reason: 'not mine' } };
    expect((await callApi(refuseMeasurementSet, refuse)).status).toBe(404);
  });
});
