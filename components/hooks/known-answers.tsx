'use client';

import type { ReactNode } from 'react';
import { SWRConfig } from 'swr';
import { apiPath } from './api-path';

interface KnownAnswersProps {
  collaboration: string;
  /** Path below the collaboration to what a hook of that path gives. */
  answers: Record<string, unknown>;
  children: ReactNode;
}

/** Answers that the page brings along: what asks for them below shows them from the first paint. */
export function KnownAnswers({ collaboration, answers, children }: KnownAnswersProps) {
  const fallback = Object.fromEntries(
    Object.entries(answers).map(([path, given]) => [apiPath(collaboration, path), given]),
  );
  return <SWRConfig value={{ fallback }}>{children}</SWRConfig>;
}
