'use client';

import { answer } from './answer';
import { request, requestNothing } from './request';

const FACTOR = '/api/v1/me/second-factor';

export const beginFactor = (password: string) =>
  request(FACTOR, answer('newKeySchema'), { method: 'POST', body: { password } });

export const confirmFactor = (code: string) =>
  request(`${FACTOR}/confirm`, answer('recoveryCodesSchema'), { method: 'POST', body: { code } });

export const renewRecoveryCodes = (code: string) =>
  request(`${FACTOR}/recovery-codes`, answer('recoveryCodesSchema'), {
    method: 'POST',
    body: { code },
  });

export const removeFactor = (password: string, code: string) =>
  requestNothing(`${FACTOR}/remove`, { method: 'POST', body: { password, code } });
