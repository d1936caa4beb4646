import { collaborationRoute } from '@/app/api/v1/handler';
import { listSurveyMaps, startMaps } from '@/lib/services/maps';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  listSurveyMaps(actor, params.survey),
);

export const POST = collaborationRoute({ scope: 'run', status: 202 }, ({ actor, params }) =>
  startMaps(actor, params.survey),
);
