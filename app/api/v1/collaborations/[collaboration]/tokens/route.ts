import { collaborationRoute } from '@/app/api/v1/handler';
import { createTokenSchema } from '@/lib/schemas/people';
import { createToken, listTokens } from '@/lib/services/tokens';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listTokens(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createTokenSchema, status: 201, tellsSecret: true },
  ({ actor, body }) => createToken(actor, body),
);
