import type { Actor } from '@/lib/access/actor';
import type { UploadKindName, UploadView } from '@/lib/schemas/uploads';
import { listCandidates } from '@/lib/services/candidates/list';
import { addObservation } from '@/lib/services/candidates/observations';
import { receiveUpload } from '@/lib/services/receive-upload';
import { storeUpload } from '@/lib/services/uploads';
import type { DemoCompanion } from './companions';

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

/** Epochs after the first, which the file of companions has no room for. */
export async function addLaterEpochs(
  actor: Actor,
  survey: string,
  companions: DemoCompanion[],
): Promise<void> {
  const { candidates } = await listCandidates(actor, { survey, limit: 500, offset: 0 });
  for (const { star, name, epochs } of companions) {
    const candidate = candidates.find((one) => one.star === star && one.name === name);
    if (!candidate) throw new Error(`the file of ${survey} brought no ${star} ${name}`);
    for (const epoch of epochs.slice(1)) {
      await addObservation(actor, candidate.id, { ...epoch, source: null });
    }
  }
}
