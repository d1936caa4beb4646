import { collaborationRoute } from '@/app/api/v1/handler';
import { commentSubmissionSchema } from '@/lib/schemas/exercises';
import { commentSubmission } from '@/lib/services/exercise-work';

export const PATCH = collaborationRoute(
  { scope: 'write', body: commentSubmissionSchema },
  ({ actor, params, body }) => commentSubmission(actor, params.exercise, params.submission, body),
);
