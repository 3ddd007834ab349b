import { getOpenApiDocument } from '@/lib/contracts/api/openapi';
import { openApiDocument } from '@/lib/contracts/api/openapi-document';
import { endpoint } from '@/lib/server/http/endpoint';

let document: ReturnType<typeof openApiDocument> | undefined;

export const GET = endpoint(getOpenApiDocument, async () => ({ ...(document ??= openApiDocument()) }));
