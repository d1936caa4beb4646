import { personRoute } from '@/app/api/v1/handler';
import { enterDemonstration } from '@/lib/services/demonstration';

/** Lets whoever is signed in look around the collaboration of invented data. */
export const POST = personRoute({ scope: 'write', sessionOnly: true }, ({ person }) =>
  enterDemonstration(person),
);
