import { listFilesRoute } from '@/app/api/v1/collection-exports';
import { mapFiles } from '@/lib/services/exports/survey-files';

/** What a completeness map can be saved as. */
export const GET = listFilesRoute((actor, { map }) => mapFiles(actor, map));
