import { fileRoute } from '@/app/api/v1/collection-exports';
import { starFiles } from '@/lib/services/exports/list-files';

/** One file of the list of stars, as an attachment. */
export const GET = fileRoute((actor) => starFiles(actor));
