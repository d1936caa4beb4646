import { personRoute } from '@/app/api/v1/handler';
import { beginFactorSchema } from '@/lib/schemas/account-access';
import { beginSecondFactor, readSecondFactor } from '@/lib/services/second-factor';

export const GET = personRoute({ scope: 'read', sessionOnly: true }, ({ person }) =>
  readSecondFactor(person),
);

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: beginFactorSchema, limit: 'password-changes' },
  ({ person, body }) => beginSecondFactor(person, body.password),
);
