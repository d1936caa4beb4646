import { config } from '@/lib/config';
import type { Role } from '@/lib/schemas/common';
import type { Message } from './transport';

/** "owner and author", "student", "author, owner and statistician". */
export function listRoles(roles: readonly Role[]): string {
  if (roles.length < 2) return roles.join('');
  return `${roles.slice(0, -1).join(', ')} and ${roles[roles.length - 1]}`;
}

const day = new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: 'UTC' });

export interface InvitationLetter {
  email: string;
  code: string;
  collaboration: string;
  roles: readonly Role[];
  invitedBy: string;
  expiresAt: Date;
}

/** One sentence, one link, who and why, how to stop it. */
export function invitationMessage(letter: InvitationLetter): Message {
  const address = new URL(`/join/${letter.code}`, config().webAddress).href;
  return {
    to: { name: '', address: letter.email },
    subject: `${letter.invitedBy} invites you to ${letter.collaboration}`,
    text: [
      `${letter.invitedBy} invites you to join ${letter.collaboration} on Rarebound as ${listRoles(letter.roles)}.`,
      `Join: ${address}`,
      `The link works once, until ${day.format(letter.expiresAt)} (UTC).`,
      `You get this message because ${letter.invitedBy} gave your address. If you do nothing, you do not join and no reminder comes; to have the invitation withdrawn, tell ${letter.invitedBy}.`,
      '',
    ].join('\n\n'),
  };
}
