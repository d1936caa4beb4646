import { openRoute } from '@/app/api/v1/handler';
import { resetPasswordSchema } from '@/lib/schemas/account-access';
import { resetPassword } from '@/lib/services/account-links';

export const POST = openRoute(
  { body: resetPasswordSchema, limit: 'reset-address' },
  ({ body, address }) => resetPassword(body, address),
);
