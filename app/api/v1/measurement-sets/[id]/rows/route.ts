import { listMeasurementRows } from '@/lib/contracts/api/measurement-set';
import { endpoint } from '@/lib/server/http/endpoint';
import { measurementRows } from '@/lib/server/reads/measurement-contents';

export const GET = endpoint(listMeasurementRows, ({ caller, params, query }) =>
  measurementRows(caller, params.id, query),
);
