import { collaborationRoute } from '@/app/api/v1/handler';
import { previewCombinationSchema } from '@/lib/schemas/combinations';
import { previewCombination } from '@/lib/services/combination-preview';

export const POST = collaborationRoute(
  { scope: 'read', body: previewCombinationSchema },
  ({ actor, body }) => previewCombination(actor, body),
);
