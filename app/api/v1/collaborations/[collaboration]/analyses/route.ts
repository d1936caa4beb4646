import { collaborationRoute } from '@/app/api/v1/handler';
import { createAnalysisSchema } from '@/lib/schemas/analyses';
import { createAnalysis, listAnalyses } from '@/lib/services/analyses';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listAnalyses(actor));

export const POST = collaborationRoute(
  { scope: 'write', body: createAnalysisSchema, status: 201 },
  ({ actor, body }) => createAnalysis(actor, body),
);
