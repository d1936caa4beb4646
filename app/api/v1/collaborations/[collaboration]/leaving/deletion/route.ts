import { collaborationRoute } from '@/app/api/v1/handler';
import { askDeletionSchema } from '@/lib/schemas/leaving';
import { askForDeletion, cancelDeletion } from '@/lib/services/leaving/deletion';

export const POST = collaborationRoute(
  { scope: 'write', body: askDeletionSchema, status: 202 },
  ({ actor, body }) => askForDeletion(actor, body),
);

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor }) => cancelDeletion(actor));
