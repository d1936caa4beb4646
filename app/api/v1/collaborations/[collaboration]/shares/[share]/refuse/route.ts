import { collaborationRoute } from '@/app/api/v1/handler';
import { refuseShareSchema } from '@/lib/schemas/sharing';
import { refuseShare } from '@/lib/services/sharing/offers';

export const POST = collaborationRoute(
  { scope: 'write', body: refuseShareSchema },
  ({ actor, params, body }) => refuseShare(actor, params.share, body.why),
);
