import { fileRoute } from '@/app/api/v1/collection-exports';
import { populationFiles } from '@/lib/services/exports/list-files';

/** One file of the list of populations, as an attachment. */
export const GET = fileRoute((actor) => populationFiles(actor));
