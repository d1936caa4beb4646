import { collaborationRoute } from '@/app/api/v1/handler';
import { agreeToRelease } from '@/lib/services/releases/sign';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  agreeToRelease(actor, params.release),
);
