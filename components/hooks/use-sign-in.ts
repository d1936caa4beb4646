'use client';

import type { LinkPurpose } from '@/lib/schemas/account-access';
import type { InvitationOffer, Me, SignUp } from '@/lib/schemas/people';
import { answer } from './answer';
import { request, requestNothing } from './request';

/** Starts a session; a refusal comes back as the sentence that the form shows. */
export async function startSession(
  email: string,
  password: string,
  secondFactor?: string,
): Promise<string | null> {
  const { signIn } = await import('next-auth/react');
  const reply = await signIn('credentials', {
    email,
    password,
    ...(secondFactor === undefined ? {} : { secondFactor }),
    redirect: false,
  });
  if (reply?.ok && !reply.error) return null;
  return reply?.error ?? 'No answer from the server; try again.';
}

/** The same by a link that came by mail. */
export async function startSessionByLink(
  code: string,
  secondFactor?: string,
): Promise<string | null> {
  const { signIn } = await import('next-auth/react');
  const reply = await signIn('link', {
    code,
    ...(secondFactor === undefined ? {} : { secondFactor }),
    redirect: false,
  });
  if (reply?.ok && !reply.error) return null;
  return reply?.error ?? 'No answer from the server; try again.';
}

/**
 * Leaves for ORCID: to sign in, or to link the iD to the account that is signed in. What becomes of it
 * stands in the address of the page that the browser comes back to.
 */
export async function leaveForOrcid(
  intent: 'orcid' | 'orcid-link',
  page: string,
): Promise<unknown> {
  const { signIn } = await import('next-auth/react');
  return signIn(intent, { callbackUrl: page });
}

/** Ends this session on the server as well as here. */
export async function endSession(): Promise<unknown> {
  const { signOut } = await import('next-auth/react');
  return signOut({ callbackUrl: '/sign-in' });
}

/** Sends a link, where there is such an account. */
export function askLink(email: string, purpose: LinkPurpose): Promise<void> {
  return requestNothing('/api/v1/account-links', { method: 'POST', body: { email, purpose } });
}

export function resetPassword(code: string, password: string): Promise<void> {
  return requestNothing('/api/v1/password-reset', { method: 'POST', body: { code, password } });
}

export function signUp(body: SignUp): Promise<unknown> {
  return request('/api/v1/sign-up', answer('anyAnswerSchema'), { method: 'POST', body });
}

export function getMe(): Promise<Me> {
  return request('/api/v1/me', answer('meSchema'));
}

export function createCollaboration(body: {
  name: string;
  slug: string;
}): Promise<{ slug: string }> {
  return request('/api/v1/collaborations', answer('slugAnswerSchema'), {
    method: 'POST',
    body,
  });
}

export function getOffer(code: string): Promise<InvitationOffer> {
  return request(`/api/v1/join/${encodeURIComponent(code)}`, answer('invitationOfferSchema'));
}

/** Joins as the person who is signed in, or as a new one with the account that is given. */
export function acceptOffer(
  code: string,
  account?: { name: string; password: string },
): Promise<{ slug: string }> {
  return request(`/api/v1/join/${encodeURIComponent(code)}`, answer('slugAnswerSchema'), {
    method: 'POST',
    body: account ?? {},
  });
}
