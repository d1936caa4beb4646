import { personRoute } from '@/app/api/v1/handler';
import { changePasswordSchema } from '@/lib/schemas/account';
import { changePassword } from '@/lib/services/people';

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: changePasswordSchema, limit: 'password-changes' },
  ({ person, body }) => changePassword(person, body),
);
