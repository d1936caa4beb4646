import { personRoute } from '@/app/api/v1/handler';
import { factorCodeSchema } from '@/lib/schemas/account-access';
import { changeRecoveryCodes } from '@/lib/services/second-factor';

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: factorCodeSchema },
  ({ person, body }) => changeRecoveryCodes(person, body.code),
);
