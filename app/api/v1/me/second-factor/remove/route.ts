import { personRoute } from '@/app/api/v1/handler';
import { removeFactorSchema } from '@/lib/schemas/account-access';
import { removeSecondFactor } from '@/lib/services/second-factor';

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: removeFactorSchema, limit: 'password-changes' },
  ({ person, body }) => removeSecondFactor(person, body),
);
