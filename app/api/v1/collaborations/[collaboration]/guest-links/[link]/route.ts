import { collaborationRoute } from '@/app/api/v1/handler';
import { revokeGuestLink } from '@/lib/services/releases/guest-links';

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  revokeGuestLink(actor, params.link),
);
