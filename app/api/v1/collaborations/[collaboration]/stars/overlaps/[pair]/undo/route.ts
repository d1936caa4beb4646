import { collaborationRoute } from '@/app/api/v1/handler';
import { decisionSchema } from '@/lib/schemas/stars';
import { undoMatch } from '@/lib/services/star-matches';
import { listOverlaps } from '@/lib/services/star-overlaps';

export const POST = collaborationRoute(
  { scope: 'write', body: decisionSchema },
  async ({ actor, params, body }) => {
    await undoMatch(actor, params.pair, body.why);
    return listOverlaps(actor);
  },
);
