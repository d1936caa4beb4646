import { collaborationRoute } from '@/app/api/v1/handler';
import { createGuestLinkSchema } from '@/lib/schemas/releases';
import { createGuestLink, listGuestLinks } from '@/lib/services/releases/guest-links';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listGuestLinks(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createGuestLinkSchema, status: 201, tellsSecret: true },
  ({ actor, body }) => createGuestLink(actor, body),
);
