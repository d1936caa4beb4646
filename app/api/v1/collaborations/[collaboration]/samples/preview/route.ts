import { collaborationRoute } from '@/app/api/v1/handler';
import { previewSampleSchema } from '@/lib/schemas/samples';
import { previewSample } from '@/lib/services/sample-preview';

export const POST = collaborationRoute(
  { scope: 'read', body: previewSampleSchema },
  ({ actor, body }) => previewSample(actor, body),
);
