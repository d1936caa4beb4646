import { personRoute } from '@/app/api/v1/handler';
import { factorCodeSchema } from '@/lib/schemas/account-access';
import { confirmSecondFactor } from '@/lib/services/second-factor';

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: factorCodeSchema },
  ({ person, body }) => confirmSecondFactor(person, body.code),
);
