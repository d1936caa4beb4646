import { collaborationRoute } from '@/app/api/v1/handler';
import { withdrawUpload } from '@/lib/services/upload-withdrawal';

export const POST = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  withdrawUpload(actor, params.upload),
);
