import { personRoute } from '@/app/api/v1/handler';
import { listSessions, removeOtherSessions } from '@/lib/services/sessions';

export const GET = personRoute({ scope: 'read', sessionOnly: true }, ({ person }) =>
  listSessions(person),
);

/** Ends every session but the one that asks. */
export const DELETE = personRoute({ scope: 'write', sessionOnly: true }, ({ person }) =>
  removeOtherSessions(person),
);
