import { collaborationRoute } from '@/app/api/v1/handler';
import { retryMessage } from '@/lib/services/mail';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  retryMessage(actor, params.message),
);
