'use client';

import useSWR from 'swr';
import type { Role } from '@/lib/schemas/common';
import type { InvitationView, MemberView, TokenView } from '@/lib/schemas/people';
import { answer } from './answer';
import { apiPath } from './api-path';
import { change } from './change';
import { request, requestNothing } from './request';

export function useMembers(collaboration: string, fallback: MemberView[]) {
  return useSWR(
    apiPath(collaboration, 'members'),
    async (path) => (await request(path, answer('membersSchema'))).members,
    { fallbackData: fallback },
  );
}

export function useInvitations(collaboration: string, fallback: InvitationView[]) {
  return useSWR(
    apiPath(collaboration, 'invitations'),
    async (path) => (await request(path, answer('invitationsSchema'))).invitations,
    { fallbackData: fallback },
  );
}

export function useTokens(collaboration: string, fallback: TokenView[]) {
  return useSWR(
    apiPath(collaboration, 'tokens'),
    async (path) => (await request(path, answer('tokensSchema'))).tokens,
    { fallbackData: fallback },
  );
}

export function changeRoles(
  collaboration: string,
  memberId: string,
  opened: Role[],
  roles: Role[],
) {
  return change(apiPath(collaboration, 'members', memberId), answer('memberSchema'), {
    part: (member) => member.roles,
    opened,
    body: { roles },
    answer: answer('anyAnswerSchema'),
  });
}

export function suspendMember(collaboration: string, memberId: string, isSuspended: boolean) {
  return request(
    apiPath(collaboration, 'members', memberId, 'suspension'),
    answer('anyAnswerSchema'),
    { method: 'POST', body: { isSuspended } },
  );
}

export function removeMember(collaboration: string, memberId: string) {
  return requestNothing(apiPath(collaboration, 'members', memberId), { method: 'DELETE' });
}

export function invite(collaboration: string, email: string, roles: Role[]) {
  return request(apiPath(collaboration, 'invitations'), answer('anyAnswerSchema'), {
    method: 'POST',
    body: { email, roles },
  });
}

/** A new code by mail; the old one opens nothing any more. */
export function resendInvitation(collaboration: string, id: string) {
  return request(apiPath(collaboration, 'invitations', id, 'resend'), answer('anyAnswerSchema'), {
    method: 'POST',
  });
}

export function revokeInvitation(collaboration: string, id: string) {
  return requestNothing(apiPath(collaboration, 'invitations', id), { method: 'DELETE' });
}

export function createToken(
  collaboration: string,
  body: { name: string; scopes: string[]; days: number },
) {
  return request(apiPath(collaboration, 'tokens'), answer('newTokenSchema'), {
    method: 'POST',
    body,
  });
}

export function revokeToken(collaboration: string, id: string) {
  return requestNothing(apiPath(collaboration, 'tokens', id), { method: 'DELETE' });
}
