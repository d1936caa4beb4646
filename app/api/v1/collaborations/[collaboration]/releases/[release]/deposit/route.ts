import { collaborationRoute } from '@/app/api/v1/handler';
import { askForDeposit, getDeposit } from '@/lib/services/deposits/deposits';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getDeposit(actor, params.release),
);

export const POST = collaborationRoute({ scope: 'write', status: 202 }, ({ actor, params }) =>
  askForDeposit(actor, params.release),
);
