'use client';

import useSWR from 'swr';
import { answer } from './answer';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

/** What can be saved: of a run, a survey, a version of a sample, or a whole list. */
export type ExportSource =
  | readonly ['runs' | 'surveys' | 'samples' | 'maps', id: string]
  | readonly ['stars' | 'populations'];

const addressOf = (collaboration: string, source: ExportSource, ...rest: string[]) =>
  apiPath(collaboration, ...source, 'exports', ...rest);

/** The files of something, once they are asked for. */
export function useExports(collaboration: string, source: ExportSource, isAsked: boolean) {
  return useSWR(
    isAsked ? addressOf(collaboration, source) : null,
    (path) => request(path, answer('exportListSchema')),
    { revalidateOnFocus: false },
  );
}

/** Address of one file; the browser itself follows it. */
export const fileAddress = (
  collaboration: string,
  source: ExportSource,
  file: string,
  query: Record<string, string> = {},
): string => withQuery(addressOf(collaboration, source, file), query);
