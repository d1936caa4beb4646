import { personRoute } from '@/app/api/v1/handler';
import { unlinkOrcid } from '@/lib/services/orcid';

export const DELETE = personRoute({ scope: 'write', sessionOnly: true }, ({ person }) =>
  unlinkOrcid(person),
);
