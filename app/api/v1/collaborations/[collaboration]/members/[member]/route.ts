import { collaborationRoute } from '@/app/api/v1/handler';
import { changeRolesSchema } from '@/lib/schemas/people';
import { changeRoles, getMember, removeMember } from '@/lib/services/members';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getMember(actor, params.member),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: changeRolesSchema,
    current: ({ actor, params }) => getMember(actor, params.member),
  },
  ({ actor, params, body }) => changeRoles(actor, params.member, body),
);

export const DELETE = collaborationRoute(
  { scope: 'write', current: ({ actor, params }) => getMember(actor, params.member) },
  ({ actor, params }) => removeMember(actor, params.member),
);
