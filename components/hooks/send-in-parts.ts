import { DetailedError, Upload } from 'tus-js-client';
import type { UploadKindName } from '@/lib/schemas/uploads';
import { apiPath, withQuery } from './api-path';
import { noAnswer, readProblem } from './api-problem';

const PART_BYTES = 8 * 2 ** 20;
/** After a lost connection: about two minutes in all. */
const AGAIN_AFTER_MS = [0, 1000, 3000, 5000, 10_000, 20_000, 40_000, 40_000];

const stopped = () =>
  noAnswer(
    'The connection was lost for too long. What has come is kept for a day: choose the same file again, and it goes on from there.',
  );

async function problemOf(error: unknown): Promise<unknown> {
  if (!(error instanceof DetailedError)) return error;
  const { originalResponse } = error;
  if (!originalResponse) return stopped();
  const status = originalResponse.getStatus();
  return status < 400
    ? stopped()
    : readProblem(new Response(originalResponse.getBody(), { status }));
}

/** A file that has come whole, and waits to be read. */
export interface SentFile {
  id: string;
  /** Once it is kept: this browser need not remember where it stood. */
  forget(): Promise<void>;
}

/**
 * Sends a large file part by part. After a lost connection, or when the same file is chosen again, it
 * goes on where it stopped.
 *
 * @throws ApiProblem
 */
export function sendInParts(
  collaboration: string,
  file: File,
  about: { kind: UploadKindName; survey?: string },
  onSent: (share: number) => void,
): Promise<SentFile> {
  const { kind, survey } = about;
  return new Promise((resolve, reject) => {
    const upload = new Upload(file, {
      endpoint: withQuery(apiPath(collaboration, 'unfinished-files'), { kind, survey }),
      chunkSize: PART_BYTES,
      retryDelays: AGAIN_AFTER_MS,
      onProgress: (sent, total) => onSent(total > 0 ? sent / total : 1),
      onError: async (error) => reject(await problemOf(error)),
      onSuccess: () =>
        resolve({
          id: upload.url?.split('/').at(-1) ?? '',
          forget: async () => {
            for (const { urlStorageKey } of await upload.findPreviousUploads()) {
              await upload.options.urlStorage?.removeUpload(urlStorageKey);
            }
          },
        }),
    });
    void upload.findPreviousUploads().then(([before]) => {
      if (before) upload.resumeFromPreviousUpload(before);
      upload.start();
    });
  });
}
