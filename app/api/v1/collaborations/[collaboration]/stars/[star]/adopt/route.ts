import { collaborationRoute } from '@/app/api/v1/handler';
import { adoptSchema } from '@/lib/schemas/stars';
import { adoptValue } from '@/lib/services/star-values';
import { getStar } from '@/lib/services/stars';

export const POST = collaborationRoute(
  { scope: 'write', body: adoptSchema },
  async ({ actor, params, body }) => {
    await adoptValue(actor, params.star, body);
    return getStar(actor, params.star);
  },
);
