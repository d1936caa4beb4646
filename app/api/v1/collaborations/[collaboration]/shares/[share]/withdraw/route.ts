import { collaborationRoute } from '@/app/api/v1/handler';
import { withdrawShareSchema } from '@/lib/schemas/sharing';
import { withdrawShare } from '@/lib/services/sharing/offers';

export const POST = collaborationRoute(
  { scope: 'write', body: withdrawShareSchema },
  ({ actor, params, body }) => withdrawShare(actor, params.share, body),
);
