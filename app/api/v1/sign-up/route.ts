import { openRoute } from '@/app/api/v1/handler';
import { signUpSchema } from '@/lib/schemas/people';
import { signUp } from '@/lib/services/people';

export const POST = openRoute(
  { body: signUpSchema, status: 201, limit: 'sign-up-address' },
  ({ body, address }) => signUp(body, address),
);
