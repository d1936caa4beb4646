import { collaborationRoute } from '@/app/api/v1/handler';
import { splitSchema } from '@/lib/schemas/stars';
import { splitStar } from '@/lib/services/star-matches';
import { getStar } from '@/lib/services/stars';

export const POST = collaborationRoute(
  { scope: 'write', body: splitSchema },
  async ({ actor, params, body }) => {
    await splitStar(actor, params.star, body);
    return getStar(actor, params.star);
  },
);
