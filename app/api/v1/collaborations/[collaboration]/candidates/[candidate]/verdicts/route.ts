import { collaborationRoute } from '@/app/api/v1/handler';
import { giveVerdictSchema } from '@/lib/schemas/candidates';
import { giveVerdict } from '@/lib/services/candidates/verdicts';

export const POST = collaborationRoute(
  { scope: 'write', body: giveVerdictSchema, status: 201 },
  ({ actor, params, body }) => giveVerdict(actor, params.candidate, body),
);
