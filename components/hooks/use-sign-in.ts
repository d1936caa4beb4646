'use client';

import { signIn, signOut } from 'next-auth/react';
import { z } from 'zod';
import {
  type InvitationOffer,
  invitationOfferSchema,
  type Me,
  meSchema,
  type SignUp,
} from '@/lib/schemas/people';
import { request } from './request';

/** Starts a session; a refusal comes back as the sentence that the form shows. */
export async function startSession(email: string, password: string): Promise<string | null> {
  const answer = await signIn('credentials', { email, password, redirect: false });
  if (answer?.ok && !answer.error) return null;
  return answer?.error ?? 'No answer from the server; try again.';
}

/** Ends this session on the server as well as here. */
export function endSession(): Promise<unknown> {
  return signOut({ callbackUrl: '/sign-in' });
}

const personSchema = z.object({ person: z.object({ email: z.string() }) });

export function signUp(body: SignUp): Promise<unknown> {
  return request('/api/v1/sign-up', personSchema.or(z.unknown()), { method: 'POST', body });
}

export function getMe(): Promise<Me> {
  return request('/api/v1/me', meSchema);
}

export function createCollaboration(body: {
  name: string;
  slug: string;
}): Promise<{ slug: string }> {
  return request('/api/v1/collaborations', z.object({ slug: z.string() }), {
    method: 'POST',
    body,
  });
}

export function getOffer(code: string): Promise<InvitationOffer> {
  return request(`/api/v1/join/${encodeURIComponent(code)}`, invitationOfferSchema);
}

/** Joins as the person who is signed in, or as a new one with the account that is given. */
export function acceptOffer(
  code: string,
  account?: { name: string; password: string },
): Promise<{ slug: string }> {
  return request(`/api/v1/join/${encodeURIComponent(code)}`, z.object({ slug: z.string() }), {
    method: 'POST',
    body: account ?? {},
  });
}
