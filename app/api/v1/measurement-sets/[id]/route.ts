import { getMeasurementSet } from '@/lib/contracts/api/measurement-set';
import { endpoint } from '@/lib/server/http/endpoint';
import { measurementSet } from '@/lib/server/reads/measurement-sets';

export const GET = endpoint(getMeasurementSet, ({ caller, params }) => measurementSet(caller, params.id));
