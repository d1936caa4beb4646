import { collaborationRoute } from '@/app/api/v1/handler';
import { decideManySchema } from '@/lib/schemas/stars';
import { confirmMatches } from '@/lib/services/star-matches';
import { listOverlaps } from '@/lib/services/star-overlaps';

export const POST = collaborationRoute(
  { scope: 'write', body: decideManySchema },
  async ({ actor, body }) => {
    await confirmMatches(actor, body.pairs, body.why);
    return listOverlaps(actor);
  },
);
