import { collaborationRoute } from '@/app/api/v1/handler';
import { answerMaps } from '@/app/api/v1/stacked-maps';
import { getRunMaps } from '@/lib/services/runs';

export const GET = collaborationRoute({ scope: 'read' }, async ({ actor, params, request }) =>
  answerMaps(await getRunMaps(actor, params.run), request),
);
