import { collaborationRoute } from '@/app/api/v1/handler';
import { uploadSettingsSchema } from '@/lib/schemas/uploads';
import { changeUpload, getUpload } from '@/lib/services/uploads';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getUpload(actor, params.upload),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: uploadSettingsSchema,
    current: ({ actor, params }) => getUpload(actor, params.upload),
  },
  ({ actor, params, body }) => changeUpload(actor, params.upload, body),
);
