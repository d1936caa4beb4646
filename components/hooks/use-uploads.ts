'use client';

import useSWR from 'swr';
import type {
  UploadDependents,
  UploadKindName,
  UploadSettings,
  UploadView,
} from '@/lib/schemas/uploads';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { noAnswer, readProblem } from './api-problem';
import { change } from './change';
import { request, requestNothing } from './request';

/** Uploads of a survey, newest first. */
export function useUploads(collaboration: string, survey: string, fallback?: UploadView[]) {
  return useSWR(
    withQuery(apiPath(collaboration, 'uploads'), { survey, limit: 100 }),
    async (path) => (await request(path, answer('uploadsAnswerSchema'))).uploads,
    { fallbackData: fallback },
  );
}

/** From here on a file goes in parts, and goes on where it stopped. */
const IN_PARTS_BYTES = 8 * 2 ** 20;

async function digestOf(file: File): Promise<string | null> {
  if (!globalThis.crypto?.subtle) return null;
  const hash = new Uint8Array(await crypto.subtle.digest('SHA-256', await file.arrayBuffer()));
  return btoa(String.fromCharCode(...hash));
}

const broken = () =>
  noAnswer(
    'The connection ended before the file was there. Nothing is stored; send it again, and it takes the place of this attempt.',
  );

/** By XMLHttpRequest, which alone tells how much of a body has gone. */
function post(
  path: string,
  file: File,
  headers: Record<string, string>,
  onSent: (share: number) => void,
): Promise<Response> {
  return new Promise((resolve, reject) => {
    const asked = new XMLHttpRequest();
    asked.open('POST', path);
    for (const [name, value] of Object.entries(headers)) asked.setRequestHeader(name, value);
    asked.upload.onprogress = ({ loaded, total, lengthComputable }) => {
      if (lengthComputable && total > 0) onSent(loaded / total);
    };
    asked.onload = () => resolve(new Response(asked.responseText, { status: asked.status }));
    asked.onerror = () => reject(broken());
    asked.onabort = () => reject(broken());
    asked.send(file);
  });
}

/**
 * Sends a file for reading; nothing of it is stored for the laboratory before `storeUpload`. The
 * same file sent again takes the place of the one that waits; a large one goes on where it stopped.
 *
 * @param onSent told the share of the file that has gone, 0 to 1
 * @throws ApiProblem with the place of each fault
 */
export async function sendUpload(
  collaboration: string,
  file: File,
  about: { kind: UploadKindName; survey?: string; settings?: UploadSettings },
  onSent: (share: number) => void = () => {},
): Promise<UploadView> {
  const query = {
    kind: about.kind,
    survey: about.survey,
    name: file.name,
    settings: about.settings && JSON.stringify(about.settings),
  };
  const address = apiPath(collaboration, 'uploads');
  if (file.size > IN_PARTS_BYTES) {
    const { sendInParts } = await import('./send-in-parts');
    const parts = await sendInParts(collaboration, file, about, onSent);
    const path = withQuery(address, { ...query, unfinished: parts.id });
    const view = await request(path, answer('uploadSchema'), { method: 'POST' });
    await parts.forget();
    return view;
  }
  const digest = await digestOf(file);
  const headers = {
    'content-type': 'application/octet-stream',
    ...(digest === null ? {} : { 'repr-digest': `sha-256=:${digest}:` }),
  };
  const response = await post(withQuery(address, query), file, headers, onSent);
  if (!response.ok) throw await readProblem(response);
  return (await answer('uploadSchema')()).parse(await response.json());
}

export function changeUpload(
  collaboration: string,
  id: string,
  opened: UploadSettings,
  settings: UploadSettings,
): Promise<UploadView> {
  return change(apiPath(collaboration, 'uploads', id), answer('uploadSchema'), {
    part: (upload) => upload.settings,
    opened,
    body: settings,
    answer: answer('uploadSchema'),
  });
}

export function storeUpload(collaboration: string, id: string): Promise<UploadView> {
  return request(apiPath(collaboration, 'uploads', id, 'store'), answer('uploadSchema'), {
    method: 'POST',
  });
}

/** What a stored file carries; asked for anew each time it is shown. */
export function readDependents(collaboration: string, id: string): Promise<UploadDependents> {
  return request(apiPath(collaboration, 'uploads', id, 'dependents'), answer('dependentsSchema'));
}

export function withdrawUpload(collaboration: string, id: string): Promise<UploadView> {
  return request(apiPath(collaboration, 'uploads', id, 'withdraw'), answer('uploadSchema'), {
    method: 'POST',
  });
}

export function forgetMapping(collaboration: string, survey: string, id: string): Promise<void> {
  return requestNothing(apiPath(collaboration, 'surveys', survey, 'column-mappings', id), {
    method: 'DELETE',
  });
}
