import { type ReadContext, type ReadResult, readUploadedFile } from '@/lib/formats';

/**
 * Reads one uploaded file away from the web process's thread.
 *
 * @param task the file's bytes (moved here) and what the reader may know besides them
 */
export default function read(task: {
  bytes: Uint8Array;
  context: ReadContext;
}): Promise<ReadResult> {
  return readUploadedFile(task.bytes, task.context);
}
