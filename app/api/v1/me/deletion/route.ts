import { personRoute } from '@/app/api/v1/handler';
import { deleteAccountSchema } from '@/lib/schemas/leaving';
import { deleteAccount } from '@/lib/services/leaving/account';

export const POST = personRoute(
  { scope: 'write', sessionOnly: true, body: deleteAccountSchema },
  ({ person, body }) => deleteAccount(person, body),
);
