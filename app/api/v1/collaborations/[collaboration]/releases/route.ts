import { collaborationRoute } from '@/app/api/v1/handler';
import { createReleaseSchema } from '@/lib/schemas/releases';
import { listReleases } from '@/lib/services/releases/describe';
import { createRelease } from '@/lib/services/releases/draft';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listReleases(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createReleaseSchema, status: 201 },
  ({ actor, body }) => createRelease(actor, body),
);
