import type { JobView } from '@/lib/schemas/jobs';

/** What the queue calls its kinds, as people would. */
export const kindWords: Record<JobView['kind'], string> = {
  'compute-maps': 'maps of a survey',
  'compute-run': 'run of an analysis',
  'compute-study': 'further question',
  'verify-release': 'check of a release',
  'recreate-run': 'run from a bundle',
  'deposit-release': 'deposit of a release',
  'export-collaboration': 'archive of everything',
};
