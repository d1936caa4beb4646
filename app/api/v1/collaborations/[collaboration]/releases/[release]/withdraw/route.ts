import { collaborationRoute } from '@/app/api/v1/handler';
import { withdrawReleaseSchema } from '@/lib/schemas/releases';
import { withdrawRelease } from '@/lib/services/releases/sign';

export const POST = collaborationRoute(
  { scope: 'write', body: withdrawReleaseSchema },
  ({ actor, params, body }) => withdrawRelease(actor, params.release, body),
);
