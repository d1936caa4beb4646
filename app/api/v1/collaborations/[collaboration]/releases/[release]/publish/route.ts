import { collaborationRoute } from '@/app/api/v1/handler';
import { publishRelease } from '@/lib/services/releases/sign';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  publishRelease(actor, params.release),
);
