import { listMeasurementFaults, MeasurementFault } from '@/lib/contracts/api/measurement-set';
import { listOf } from '@/lib/contracts/common';
import { csvLines } from '@/lib/formats/csv-writer';
import { download } from '@/lib/server/http/download';
import { endpoint } from '@/lib/server/http/endpoint';
import { allMeasurementFaults, measurementFaults } from '@/lib/server/reads/measurement-contents';

const List = listOf(MeasurementFault);

export const GET = endpoint(listMeasurementFaults, async ({ caller, params, query }) => {
  if (query.format === 'json') {
    const faults = await measurementFaults(caller, params.id, query);
    return Response.json(List.parse(faults), { headers: { 'cache-control': 'private, no-store' } });
  }
  const { set, faults } = await allMeasurementFaults(caller, params.id);
  const head = ['line', 'column', 'value', 'fault', 'remedy'];
  const rows = faults.map(({ line, column, value, message, remedy }) => [
    line,
    column,
    value,
    message,
    remedy,
  ]);
  return download(csvLines([head, ...rows]), {
    fileName: `${set.fileName.replace(/\.[^.]*$/, '')}-faults.csv`,
    contentType: 'text/csv; charset=utf-8',
  });
});
