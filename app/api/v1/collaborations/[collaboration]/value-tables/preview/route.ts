import { collaborationRoute } from '@/app/api/v1/handler';
import { previewAdoptionSchema } from '@/lib/schemas/stars';
import { previewAdoption } from '@/lib/services/star-preview';

export const POST = collaborationRoute(
  { scope: 'read', body: previewAdoptionSchema },
  ({ actor, body }) => previewAdoption(actor, body),
);
