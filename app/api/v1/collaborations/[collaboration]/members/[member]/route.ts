import { collaborationRoute } from '@/app/api/v1/handler';
import { changeRolesSchema } from '@/lib/schemas/people';
import { changeRoles, removeMember } from '@/lib/services/members';

export const PATCH = collaborationRoute(
  { scope: 'write', body: changeRolesSchema },
  ({ actor, params, body }) => changeRoles(actor, params.member, body),
);

export const DELETE = collaborationRoute({ scope: 'write' }, ({ actor, params }) =>
  removeMember(actor, params.member),
);
