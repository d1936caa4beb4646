import { openRoute } from '@/app/api/v1/handler';
import { askLinkSchema } from '@/lib/schemas/account-access';
import { askLink } from '@/lib/services/account-links';

export const POST = openRoute({ body: askLinkSchema }, ({ body, address }) =>
  askLink(body, address),
);
