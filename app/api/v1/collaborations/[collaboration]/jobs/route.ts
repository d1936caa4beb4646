import { collaborationRoute } from '@/app/api/v1/handler';
import { listJobs } from '@/lib/services/jobs';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => listJobs(actor));
