'use client';

import { useEffect, useState } from 'react';
import useSWR from 'swr';
import { answer } from './answer';
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
  const found = useSWR(
    settled === ''
      ? null
      : withQuery(apiPath(collaboration, 'search'), { q: settled.slice(0, 100) }),
    async (path) => (await request(path, answer('searchAnswerSchema'))).hits,
    { keepPreviousData: true, revalidateOnFocus: false, shouldRetryOnError: false },
  );
  return { ...found, isSettled: settled === words.trim() && !found.isLoading };
}
