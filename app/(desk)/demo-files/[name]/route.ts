import { currentCaller } from '@/lib/server/identity/current-caller';
import { demoFile } from '@/lib/server/reads/demo-files';

interface Context {
  readonly params: Promise<{ readonly name: string }>;
}

/** A sample table of the demo as a download. It is no call of the HTTP interface: outside the demo it is not there. */
export async function GET(_request: Request, { params }: Context): Promise<Response> {
  const [{ name }, caller] = await Promise.all([params, currentCaller()]);
  const content = caller && (await demoFile(caller, name));
  if (content === null) return new Response('There is no such sample file.\n', { status: 404 });
  return new Response(new Uint8Array(content), {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="${name}"`,
      'cache-control': 'private, no-store',
    },
  });
}
