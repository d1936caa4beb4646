import type { Actor } from '@/lib/access/actor';
import type { UploadKindName, UploadView } from '@/lib/schemas/uploads';
import { receiveUpload, storeUpload } from '@/lib/services/uploads';

/** Brings one file in by the way that everybody's files come: read, checked, stored. */
export async function bringIn(
  actor: Actor,
  kind: UploadKindName,
  name: string,
  text: string,
  survey?: string,
  settings?: Record<string, unknown>,
): Promise<UploadView> {
  const request = new Request('http://localhost/uploads', { method: 'POST', body: text });
  const query = { kind, name, survey, settings: settings && JSON.stringify(settings) };
  const read = await receiveUpload(actor, query, request);
  return storeUpload(actor, read.id);
}
