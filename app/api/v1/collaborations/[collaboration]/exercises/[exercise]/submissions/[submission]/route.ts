import { collaborationRoute } from '@/app/api/v1/handler';
import { commentSubmissionSchema } from '@/lib/schemas/exercises';
import { commentSubmission, getSubmission } from '@/lib/services/exercise-work';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor, params }) =>
  getSubmission(actor, params.exercise, params.submission),
);

export const PATCH = collaborationRoute(
  {
    scope: 'write',
    body: commentSubmissionSchema,
    current: ({ actor, params }) => getSubmission(actor, params.exercise, params.submission),
  },
  ({ actor, params, body }) => commentSubmission(actor, params.exercise, params.submission, body),
);
