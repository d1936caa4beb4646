import { collaborationRoute } from '@/app/api/v1/handler';
import { refreshShare } from '@/lib/services/sharing/offers';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  refreshShare(actor, params.share),
);
