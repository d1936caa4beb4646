import { personRoute } from '@/app/api/v1/handler';
import { updateMeSchema } from '@/lib/schemas/account';
import { getMe, updateMe } from '@/lib/services/people';

export const GET = personRoute({ scope: 'read' }, ({ person }) => getMe(person));

export const PATCH = personRoute(
  {
    scope: 'write',
    sessionOnly: true,
    body: updateMeSchema,
    current: ({ person }) => getMe(person),
  },
  ({ person, body }) => updateMe(person, body),
);
