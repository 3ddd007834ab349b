import { listMeasurementSets, uploadMeasurements } from '@/lib/contracts/api/measurement-set';
import { receiveMeasurements } from '@/lib/server/acts/receive-measurements';
import { demandUpload, storeMeasurements } from '@/lib/server/acts/store-measurements';
import { endpoint } from '@/lib/server/http/endpoint';
import { uploadBody } from '@/lib/server/http/upload-body';
import { nightMeasurements } from '@/lib/server/reads/measurement-sets';

export const GET = endpoint(listMeasurementSets, ({ caller, params, query }) =>
  nightMeasurements(caller, params.id, query),
);

/** Not behind proxy.ts, which cuts a body at 10 MB: its matcher leaves this path out. */
export const POST = endpoint(uploadMeasurements, async ({ caller, params, query, request, once }) => {
  // Whoever may not upload hears so before the first byte.
  await demandUpload(caller, params.id);
  const { bytes, ...about } = await uploadBody(request);
  const stored = await storeMeasurements(caller, params.id, bytes);
  return once(stored.sha256, () => receiveMeasurements(caller, params.id, query, { ...about, ...stored }));
});
