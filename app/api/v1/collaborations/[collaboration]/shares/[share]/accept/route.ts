import { collaborationRoute } from '@/app/api/v1/handler';
import { acceptShare } from '@/lib/services/sharing/offers';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  acceptShare(actor, params.share),
);
