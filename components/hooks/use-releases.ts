'use client';

import useSWR from 'swr';
import type { BundleImportView } from '@/lib/schemas/bundles';
import type { FreezeStanding, GuestLinkView, ReleaseView } from '@/lib/schemas/releases';
import { answer } from './answer';
import { apiPath } from './api-path';
import { readProblem } from './api-problem';
import { change, removeShown } from './change';
import { request, requestNothing } from './request';

const CHECK_MS = 2000;

/** One release; asked again while it is being run again from its inputs. */
export function useRelease(collaboration: string, fallback: ReleaseView) {
  return useSWR(
    apiPath(collaboration, 'releases', fallback.id),
    (path) => request(path, answer('releaseSchema')),
    {
      fallbackData: fallback,
      refreshInterval: (view) => (view?.state === 'checking' ? CHECK_MS : 0),
    },
  );
}

/** Runs brought in with bundles; asked again while one is on its way. */
export function useImports(collaboration: string, fallback: BundleImportView[]) {
  return useSWR(
    apiPath(collaboration, 'bundles'),
    async (path) => (await request(path, answer('importsAnswerSchema'))).imports,
    {
      fallbackData: fallback,
      refreshInterval: (imports) =>
        imports?.some(({ status }) => status === 'waiting' || status === 'running') ? CHECK_MS : 0,
    },
  );
}

export function useGuestLinks(collaboration: string, fallback: GuestLinkView[]) {
  return useSWR(
    apiPath(collaboration, 'guest-links'),
    async (path) => (await request(path, answer('linksAnswerSchema'))).links,
    { fallbackData: fallback },
  );
}

export type ReleaseStep = 'sign-off' | 'agree' | 'check' | 'publish';

export const takeStep = (collaboration: string, id: string, step: ReleaseStep) =>
  request(apiPath(collaboration, 'releases', id, step), answer('releaseSchema'), {
    method: 'POST',
  });

export const withdrawRelease = (collaboration: string, id: string, reason: string) =>
  request(apiPath(collaboration, 'releases', id, 'withdraw'), answer('releaseSchema'), {
    method: 'POST',
    body: { reason },
  });

export const createRelease = (collaboration: string, body: unknown): Promise<ReleaseView> =>
  request(apiPath(collaboration, 'releases'), answer('releaseSchema'), { method: 'POST', body });

export const updateRelease = <Draft>(
  collaboration: string,
  id: string,
  part: (release: ReleaseView) => Draft,
  opened: Draft,
  body: unknown,
) =>
  change(apiPath(collaboration, 'releases', id), answer('releaseSchema'), {
    part,
    opened,
    body,
    answer: answer('releaseSchema'),
  });

/** @param part what of the draft was shown as `opened` */
export const removeRelease = <Draft>(
  collaboration: string,
  id: string,
  part: (release: ReleaseView) => Draft,
  opened: Draft,
) => removeShown(apiPath(collaboration, 'releases', id), answer('releaseSchema'), { part, opened });

export const freezeRun = (
  collaboration: string,
  runId: string,
  reason: string,
): Promise<FreezeStanding> =>
  request(apiPath(collaboration, 'runs', runId, 'freeze'), answer('freezeStandingSchema'), {
    method: 'POST',
    body: reason === '' ? {} : { reason },
  });

export const createGuestLink = (collaboration: string, body: unknown) =>
  request(apiPath(collaboration, 'guest-links'), answer('newGuestLinkSchema'), {
    method: 'POST',
    body,
  });

export const revokeGuestLink = (collaboration: string, id: string) =>
  requestNothing(apiPath(collaboration, 'guest-links', id), { method: 'DELETE' });

export const bundleAddress = (collaboration: string, runId: string) =>
  apiPath(collaboration, 'runs', runId, 'bundle');

export const writeGuestNote = (token: string, body: { name: string; body: string }) =>
  request(`/api/v1/guest/${encodeURIComponent(token)}/notes`, answer('guestNoteSchema'), {
    method: 'POST',
    body,
  });

/** Sends an archive as it is. @throws ApiProblem */
export async function sendBundle(collaboration: string, file: File): Promise<BundleImportView> {
  const response = await fetch(apiPath(collaboration, 'bundles'), {
    method: 'POST',
    headers: { accept: 'application/json', 'content-type': 'application/zip' },
    body: file,
  });
  if (!response.ok) throw await readProblem(response);
  return (await answer('bundleImportSchema')()).parse(await response.json());
}
