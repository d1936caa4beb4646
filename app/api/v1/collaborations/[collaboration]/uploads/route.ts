import { z } from 'zod';
import { collaborationRoute } from '@/app/api/v1/handler';
import { pageSchema } from '@/lib/schemas/common';
import { uploadQuerySchema } from '@/lib/schemas/uploads';
import { receiveUpload } from '@/lib/services/receive-upload';
import { listUploads } from '@/lib/services/uploads';

const listQuerySchema = pageSchema.extend({ survey: z.string().optional() });

export const GET = collaborationRoute(
  { scope: 'read', query: listQuerySchema, paged: 'uploads' },
  async ({ actor, query }) => ({ uploads: await listUploads(actor, query.survey, query) }),
);

/** The body is the file itself, streamed; nothing is stored of a file that cannot be read. */
export const POST = collaborationRoute(
  { scope: 'write', query: uploadQuerySchema, rawBody: true, limit: 'uploads', status: 201 },
  ({ actor, query, request }) => receiveUpload(actor, query, request),
);
