import { collaborationRoute } from '@/app/api/v1/handler';
import { updateAnalysisSchema } from '@/lib/schemas/analyses';
import { getAnalysis, removeAnalysis, updateAnalysis } from '@/lib/services/analyses';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getAnalysis(actor, params.analysis),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: updateAnalysisSchema,
    current: ({ actor, params }) => getAnalysis(actor, params.analysis),
  },
  ({ actor, params, body }) => updateAnalysis(actor, params.analysis, body),
);

export const DELETE = collaborationRoute(
  { scope: 'write', current: ({ actor, params }) => getAnalysis(actor, params.analysis) },
  ({ actor, params }) => removeAnalysis(actor, params.analysis),
);
