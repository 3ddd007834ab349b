import { z } from 'zod';
import { operation } from './operation';

export const getOpenApiDocument = operation({
  id: 'getOpenApiDocument',
  method: 'get',
  path: '/openapi.json',
  tag: 'service',
  summary: 'This interface as an OpenAPI 3.1 document',
  answer: z.record(z.string(), z.unknown()),
  open: true,
});
