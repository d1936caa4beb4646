import { fileRoute } from '@/app/api/v1/collection-exports';
import { sampleFiles } from '@/lib/services/exports/list-files';

/** One file of a version of a sample, as an attachment. */
export const GET = fileRoute((actor, { sample }) => sampleFiles(actor, sample));
