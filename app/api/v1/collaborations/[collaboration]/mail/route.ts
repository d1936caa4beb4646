import { collaborationRoute } from '@/app/api/v1/handler';
import { listFailedMessages } from '@/lib/services/mail';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listFailedMessages(actor));
