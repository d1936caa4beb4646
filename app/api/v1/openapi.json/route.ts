import { openRoute } from '@/app/api/v1/handler';
import { config } from '@/lib/config';
import { buildOpenApi, type OpenApiDocument } from '@/lib/schemas/openapi';

let document: OpenApiDocument | undefined;

export const GET = openRoute({}, async () => {
  document ??= buildOpenApi(new URL(config().webAddress).origin);
  return document;
});
