import { collaborationRoute } from '@/app/api/v1/handler';
import { suspensionSchema } from '@/lib/schemas/people';
import { suspendMember } from '@/lib/services/members';

export const POST = collaborationRoute(
  { scope: 'write', body: suspensionSchema },
  ({ actor, params, body }) => suspendMember(actor, params.member, body),
);
