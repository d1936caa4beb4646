import { collaborationRoute } from '@/app/api/v1/handler';
import { storeUpload } from '@/lib/services/uploads';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  storeUpload(actor, params.upload),
);
