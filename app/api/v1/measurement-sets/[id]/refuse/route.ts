import { refuseMeasurementSet } from '@/lib/contracts/api/measurement-set';
import { refuseMeasurements } from '@/lib/server/acts/refuse-measurements';
import { endpoint } from '@/lib/server/http/endpoint';
import { measurementSet } from '@/lib/server/reads/measurement-sets';

export const POST = endpoint(refuseMeasurementSet, async ({ caller, params, body }) => {
  await refuseMeasurements(caller, params.id, body.reason);
  return measurementSet(caller, params.id);
});
