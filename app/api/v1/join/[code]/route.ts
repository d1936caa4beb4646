import { openRoute } from '@/app/api/v1/handler';
import { joinSchema } from '@/lib/schemas/account';
import { acceptInvitation, getOffer } from '@/lib/services/invitations';

export const GET = openRoute({}, ({ params }) => getOffer(params.code));

export const POST = openRoute(
  { body: joinSchema, status: 201, limit: 'sign-up-address' },
  ({ params, person, body, address }) => acceptInvitation(params.code, person, body, address),
);
