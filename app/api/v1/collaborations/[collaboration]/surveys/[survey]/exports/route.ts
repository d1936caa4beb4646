import { listFilesRoute } from '@/app/api/v1/collection-exports';
import { surveyFiles } from '@/lib/services/exports/survey-files';

/** What a survey can be saved as. */
export const GET = listFilesRoute((actor, { survey }) => surveyFiles(actor, survey));
