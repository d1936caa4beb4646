import { collaborationRoute } from '@/app/api/v1/handler';
import { answerMaps } from '@/app/api/v1/stacked-maps';
import { studyMapsQuerySchema } from '@/lib/schemas/studies';
import { getStudyMaps } from '@/lib/services/studies';

export const GET = collaborationRoute(
  { scope: 'read', query: studyMapsQuerySchema },
  async ({ actor, params, query, request }) =>
    answerMaps(await getStudyMaps(actor, params.study, query), request),
);
