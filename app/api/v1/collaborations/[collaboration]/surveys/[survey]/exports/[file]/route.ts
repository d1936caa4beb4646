import { fileRoute } from '@/app/api/v1/collection-exports';
import { surveyFiles } from '@/lib/services/exports/survey-files';

/** One file of a survey, as an attachment. */
export const GET = fileRoute((actor, { survey }) => surveyFiles(actor, survey));
