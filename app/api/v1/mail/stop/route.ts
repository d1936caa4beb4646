import { openRoute } from '@/app/api/v1/handler';
import { stopMailSchema } from '@/lib/schemas/mail';
import { stopMail } from '@/lib/services/mail';

export const POST = openRoute({ body: stopMailSchema }, ({ body, address }) =>
  stopMail(body.token, address),
);
