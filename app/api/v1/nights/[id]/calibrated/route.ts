import { downloadCalibrated } from '@/lib/contracts/api/calibrated';
import { download } from '@/lib/server/http/download';
import { endpoint } from '@/lib/server/http/endpoint';
import { streamOf } from '@/lib/server/http/stream-of';
import { calibratedDownload } from '@/lib/server/reads/calibrated-download';

const types = { csv: 'text/csv; charset=utf-8', json: 'application/json' } as const;

export const GET = endpoint(downloadCalibrated, async ({ caller, params, query }) => {
  const { name, text } = await calibratedDownload(caller, params.id, query);
  return download(streamOf(text), {
    fileName: `${name}.${query.format}`,
    contentType: types[query.format],
  });
});
