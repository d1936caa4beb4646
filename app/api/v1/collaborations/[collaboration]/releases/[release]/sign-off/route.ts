import { collaborationRoute } from '@/app/api/v1/handler';
import { signOffRelease } from '@/lib/services/releases/sign';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  signOffRelease(actor, params.release),
);
