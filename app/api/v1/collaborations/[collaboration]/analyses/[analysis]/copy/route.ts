import { collaborationRoute } from '@/app/api/v1/handler';
import { copyAnalysisSchema } from '@/lib/schemas/analyses';
import { copyAnalysis } from '@/lib/services/analyses';

export const POST = collaborationRoute(
  { scope: 'write', body: copyAnalysisSchema, status: 201 },
  ({ actor, params, body }) => copyAnalysis(actor, params.analysis, body),
);
