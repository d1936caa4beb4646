'use client';

import useSWR from 'swr';
import type { z } from 'zod';
import type { offerSurveySchema, Shares, ShareView, WithdrawShare } from '@/lib/schemas/sharing';
import { answer } from './answer';
import { apiPath } from './api-path';
import { request } from './request';

export function useShares(collaboration: string, fallback: Shares) {
  return useSWR(apiPath(collaboration, 'shares'), (path) => request(path, answer('sharesSchema')), {
    fallbackData: fallback,
  });
}

export function offerSurvey(
  collaboration: string,
  survey: string,
  body: z.input<typeof offerSurveySchema>,
): Promise<ShareView> {
  const path = apiPath(collaboration, 'surveys', survey, 'shares');
  return request(path, answer('shareSchema'), { method: 'POST', body });
}

const act = (collaboration: string, id: string, verb: string, body?: unknown) =>
  request(apiPath(collaboration, 'shares', id, verb), answer('shareSchema'), {
    method: 'POST',
    body,
  });

export const acceptShare = (collaboration: string, id: string) => act(collaboration, id, 'accept');
export const refreshShare = (collaboration: string, id: string) =>
  act(collaboration, id, 'refresh');
export const refuseShare = (collaboration: string, id: string, why: string) =>
  act(collaboration, id, 'refuse', { why });
export const withdrawShare = (collaboration: string, id: string, body: WithdrawShare) =>
  act(collaboration, id, 'withdraw', body);
