import { listFilesRoute } from '@/app/api/v1/collection-exports';
import { populationFiles } from '@/lib/services/exports/list-files';

/** What the list of populations can be saved as. */
export const GET = listFilesRoute((actor) => populationFiles(actor));
