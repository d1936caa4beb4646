'use client';

import useSWR from 'swr';
import { z } from 'zod';
import {
  type UploadKindName,
  type UploadSettings,
  type UploadView,
  uploadSchema,
} from '@/lib/schemas/uploads';
import { apiPath, withQuery } from './api-path';
import { ApiProblem, readProblem } from './api-problem';
import { request } from './request';

/** Uploads of a survey, newest first. */
export function useUploads(collaboration: string, survey: string, fallback?: UploadView[]) {
  return useSWR(
    withQuery(apiPath(collaboration, 'uploads'), { survey, limit: 100 }),
    async (path) => (await request(path, z.object({ uploads: z.array(uploadSchema) }))).uploads,
    { fallbackData: fallback },
  );
}

async function digestOf(file: File): Promise<string | null> {
  // The digest needs the whole file in memory; beyond this size the length alone is checked.
  if (file.size > 64 * 2 ** 20 || !globalThis.crypto?.subtle) return null;
  const hash = new Uint8Array(await crypto.subtle.digest('SHA-256', await file.arrayBuffer()));
  return btoa(String.fromCharCode(...hash));
}

/**
 * Sends a file for reading; nothing of it is stored for the laboratory before `storeUpload`.
 *
 * @throws ApiProblem with the place of each fault
 */
export async function sendUpload(
  collaboration: string,
  file: File,
  about: { kind: UploadKindName; survey?: string; settings?: UploadSettings },
): Promise<UploadView> {
  const path = withQuery(apiPath(collaboration, 'uploads'), {
    kind: about.kind,
    survey: about.survey,
    name: file.name,
    settings: about.settings && JSON.stringify(about.settings),
  });
  const digest = await digestOf(file);
  let response: Response;
  try {
    response = await fetch(path, {
      method: 'POST',
      body: file,
      headers: {
        'content-type': 'application/octet-stream',
        ...(digest === null ? {} : { 'repr-digest': `sha-256=:${digest}:` }),
      },
    });
  } catch {
    throw new ApiProblem({
      type: 'about:blank',
      title: 'No answer',
      status: 0,
      code: 'no-answer',
      detail: 'The connection ended before the file was there. Nothing is stored; send it again.',
    });
  }
  if (!response.ok) throw await readProblem(response);
  return uploadSchema.parse(await response.json());
}

export function changeUpload(
  collaboration: string,
  id: string,
  settings: UploadSettings,
): Promise<UploadView> {
  return request(apiPath(collaboration, 'uploads', id), uploadSchema, {
    method: 'PATCH',
    body: settings,
  });
}

export function storeUpload(collaboration: string, id: string): Promise<UploadView> {
  return request(apiPath(collaboration, 'uploads', id, 'store'), uploadSchema, { method: 'POST' });
}
