import { checkMeasurementSet } from '@/lib/contracts/api/measurement-set';
import { checkMeasurementsAgain } from '@/lib/server/acts/check-measurements-again';
import { endpoint } from '@/lib/server/http/endpoint';

export const POST = endpoint(checkMeasurementSet, ({ caller, params }) =>
  checkMeasurementsAgain(caller, params.id),
);
