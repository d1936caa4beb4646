import type { ApiProblem } from '@/components/hooks/api-problem';
import type { UploadKindName, UploadSettings, UploadView } from '@/lib/schemas/uploads';

/** One file on its way in: as it was given, what reading it said, and whether it is stored. */
export interface IncomingEntry {
  key: string;
  file: File;
  kind: UploadKindName;
  settings: UploadSettings;
  /** Share of the file that has gone to the server, 0 to 1. */
  sent?: number;
  state: 'reading' | 'read' | 'refused' | 'storing' | 'stored';
  upload: UploadView | null;
  problem: ApiProblem | null;
  /** Any other failure, as a sentence. */
  failure: string | null;
}
