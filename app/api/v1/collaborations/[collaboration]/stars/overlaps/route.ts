import { collaborationRoute } from '@/app/api/v1/handler';
import { proposePairs } from '@/lib/services/star-matches';
import { listOverlaps } from '@/lib/services/star-overlaps';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listOverlaps(actor));

export const POST = collaborationRoute({ scope: 'write' }, ({ actor }) => proposePairs(actor));
