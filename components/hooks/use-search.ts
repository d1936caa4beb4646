'use client';

import { useEffect, useState } from 'react';
import useSWR from 'swr';
import { searchAnswerSchema } from '@/lib/schemas/search';
import { apiPath, withQuery } from './api-path';
import { request } from './request';

/** Between two letters of a quick hand: shorter would ask for every one of them. */
const STILL_MS = 120;

/** What the collaboration has under these words; the last answer stays while the next is on its way. */
export function useSearch(collaboration: string, words: string) {
  const [settled, setSettled] = useState(words.trim());
  useEffect(() => {
    const timer = setTimeout(() => setSettled(words.trim()), STILL_MS);
    return () => clearTimeout(timer);
  }, [words]);
  const answer = useSWR(
    settled === ''
      ? null
      : withQuery(apiPath(collaboration, 'search'), { q: settled.slice(0, 100) }),
    async (path) => (await request(path, searchAnswerSchema)).hits,
    { keepPreviousData: true, revalidateOnFocus: false, shouldRetryOnError: false },
  );
  return { ...answer, isSettled: settled === words.trim() && !answer.isLoading };
}
