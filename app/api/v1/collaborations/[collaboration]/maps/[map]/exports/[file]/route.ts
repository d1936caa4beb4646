import { fileRoute } from '@/app/api/v1/collection-exports';
import { mapFiles } from '@/lib/services/exports/survey-files';

/** One file of a completeness map, as an attachment. */
export const GET = fileRoute((actor, { map }) => mapFiles(actor, map));
