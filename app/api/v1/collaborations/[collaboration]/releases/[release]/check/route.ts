import { collaborationRoute } from '@/app/api/v1/handler';
import { checkReleaseAgain } from '@/lib/services/releases/sign';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  checkReleaseAgain(actor, params.release),
);
