import { collaborationRoute } from '@/app/api/v1/handler';
import { askForExport } from '@/lib/services/leaving/exports';

export const POST = collaborationRoute({ scope: 'write', status: 202 }, ({ actor }) =>
  askForExport(actor),
);
