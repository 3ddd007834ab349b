import 'server-only';

export interface Download {
  /** As people named it: any characters. */
  readonly fileName: string;
  readonly contentType: string;
}

/** An answer that a browser saves instead of showing it. Next leaves its length out, whatever the answer says. */
export function download(body: string | ReadableStream, { fileName, contentType }: Download): Response {
  return new Response(body, {
    headers: {
      'content-type': contentType,
      'content-disposition': disposition(fileName),
      'cache-control': 'private, no-store',
    },
  });
}

/** RFC 6266: a plain name for old clients, the true one beside it. */
function disposition(fileName: string): string {
  const plain = fileName.replace(/[^\x20-\x7e]|["\\%/]/g, '_');
  const exact = encodeURIComponent(fileName).replace(
    /['()*]/g,
    (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`,
  );
  return `attachment; filename="${plain}"; filename*=UTF-8''${exact}`;
}
