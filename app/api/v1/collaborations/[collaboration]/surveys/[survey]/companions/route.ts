import { collaborationRoute } from '@/app/api/v1/handler';
import { listCompanions } from '@/lib/services/targets';

export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params }) => ({
  companions: await listCompanions(actor, params.survey),
}));
