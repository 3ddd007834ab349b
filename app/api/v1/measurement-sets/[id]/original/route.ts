import { getMeasurementOriginal } from '@/lib/contracts/api/measurement-set';
import { download } from '@/lib/server/http/download';
import { endpoint } from '@/lib/server/http/endpoint';
import { measurementOriginal } from '@/lib/server/reads/measurement-contents';

export const GET = endpoint(getMeasurementOriginal, async ({ caller, params }) => {
  const { set, body } = await measurementOriginal(caller, params.id);
  // The type says nothing of the content: whatever somebody uploaded, no browser is to show or run it.
  return download(body, { fileName: set.fileName, contentType: 'application/octet-stream' });
});
