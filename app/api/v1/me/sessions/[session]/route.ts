import { personRoute } from '@/app/api/v1/handler';
import { removeSession } from '@/lib/services/sessions';

export const DELETE = personRoute({ scope: 'write', sessionOnly: true }, ({ person, params }) =>
  removeSession(person, params.session),
);
