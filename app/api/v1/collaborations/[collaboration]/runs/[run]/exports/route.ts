import { collaborationRoute } from '@/app/api/v1/handler';
import { listExports } from '@/lib/services/exports';

/** What a finished run can be saved as. */
export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  listExports(actor, params.run),
);
