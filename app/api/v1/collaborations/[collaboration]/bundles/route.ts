import { z } from 'zod';
import { collaborationRoute } from '@/app/api/v1/handler';
import { listImports, receiveBundle } from '@/lib/services/releases/import-bundle';

/** Which run of a bundle that holds several: the name of its folder. */
const querySchema = z.strictObject({ run: z.string().max(100).optional() });

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listImports(actor));

/** The body is the archive itself, streamed; all of it is stored, or nothing. */
export const POST = collaborationRoute(
  { scope: 'write', query: querySchema, rawBody: true, limit: 'uploads', status: 201 },
  ({ actor, query, request }) => receiveBundle(actor, request, query.run),
);
