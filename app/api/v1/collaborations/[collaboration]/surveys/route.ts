import { collaborationRoute } from '@/app/api/v1/handler';
import { createSurveySchema } from '@/lib/schemas/surveys';
import { createSurvey, listSurveys } from '@/lib/services/surveys';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listSurveys(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createSurveySchema, status: 201 },
  ({ actor, body }) => createSurvey(actor, body),
);
