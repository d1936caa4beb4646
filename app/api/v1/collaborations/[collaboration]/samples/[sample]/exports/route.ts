import { listFilesRoute } from '@/app/api/v1/collection-exports';
import { sampleFiles } from '@/lib/services/exports/list-files';

/** What a version of a sample can be saved as. */
export const GET = listFilesRoute((actor, { sample }) => sampleFiles(actor, sample));
