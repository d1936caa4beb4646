import { collaborationRoute } from '@/app/api/v1/handler';
import { updateSurveySchema } from '@/lib/schemas/surveys';
import { getSurvey, updateSurvey } from '@/lib/services/surveys';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getSurvey(actor, params.survey),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: updateSurveySchema,
    current: ({ actor, params }) => getSurvey(actor, params.survey),
  },
  ({ actor, params, body }) => updateSurvey(actor, params.survey, body),
);
