import { collaborationRoute } from '@/app/api/v1/handler';
import { offerSurveySchema } from '@/lib/schemas/sharing';
import { offerSurvey } from '@/lib/services/sharing/offers';

export const POST = collaborationRoute(
  { scope: 'write', body: offerSurveySchema, status: 201 },
  ({ actor, params, body }) => offerSurvey(actor, params.survey, body),
);
