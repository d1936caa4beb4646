import { listFilesRoute } from '@/app/api/v1/collection-exports';
import { starFiles } from '@/lib/services/exports/list-files';

/** What the list of stars can be saved as. */
export const GET = listFilesRoute((actor) => starFiles(actor));
