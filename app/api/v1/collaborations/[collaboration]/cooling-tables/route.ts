import { collaborationRoute } from '@/app/api/v1/handler';
import { listCoolingTables } from '@/lib/services/cooling-tables';

export const GET = collaborationRoute({ scope: 'read' }, async ({ actor }) => ({
  coolingTables: await listCoolingTables(actor),
}));
