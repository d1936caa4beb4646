import { type ZodType, z } from 'zod';
import { roleSchema } from '@/lib/schemas/common';
import type { MailPreference } from '@/lib/schemas/mail';
import type { Letter } from './letter';
import { listRoles } from './role-words';

const word = z.string().min(1).max(300);
/** A place on this server; never another host. */
const path = z.string().regex(/^\/(?![/\\])/, 'a path on this server');
const day = new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: 'UTC' });
const time = new Intl.DateTimeFormat('en-GB', {
  dateStyle: 'long',
  timeStyle: 'short',
  timeZone: 'UTC',
});

const changes = {
  password: {
    subject: 'Your password was changed',
    sentence: 'The password of your account was changed, and every other session ended,',
  },
  'second-factor-on': {
    subject: 'Signing in now asks for a code',
    sentence: 'A second factor was turned on for your account',
  },
  'second-factor-off': {
    subject: 'Signing in no longer asks for a code',
    sentence: 'The second factor of your account was turned off',
  },
} as const;
type Change = keyof typeof changes;

interface MailKind<Data> {
  schema: ZodType<Data>;
  /** The switch that stops it; null for what cannot be stopped. */
  preference: MailPreference | null;
  compose(data: Data): Letter;
}
const kind = <Data>(given: MailKind<Data>) => given;

const aboutItem = { collaboration: word, who: word, item: word, path };
const member = (collaboration: string) => `You get this message as a member of ${collaboration}`;

export const mailKinds = {
  invitation: kind({
    schema: z.object({
      collaboration: word,
      invitedBy: word,
      roles: z.array(roleSchema).min(1),
      code: word,
      expiresAt: z.coerce.date(),
    }),
    preference: null,
    compose: ({ collaboration, invitedBy, roles, code, expiresAt }) => ({
      subject: `${invitedBy} invites you to ${collaboration}`,
      sentence: `${invitedBy} invites you to join ${collaboration} on Rarebound as ${listRoles(roles)}.`,
      link: { label: 'Join', path: `/join/${code}` },
      notes: [`The link works once, until ${day.format(expiresAt)} (UTC).`],
      why: `You get this message because ${invitedBy} gave your address. If you do nothing, you do not join and no reminder comes; to have the invitation withdrawn, tell ${invitedBy}.`,
    }),
  }),
  mention: kind({
    schema: z.object(aboutItem),
    preference: 'mention',
    compose: ({ collaboration, who, item, path: to }) => ({
      subject: `${who} mentions you in a note on ${item}`,
      sentence: `${who} mentions you in a note on ${item} in ${collaboration}.`,
      link: { label: 'Read the note', path: to },
      why: `You get this message because the note names you.`,
    }),
  }),
  /** Gathered for an hour: each note adds a line to the message that waits. */
  notes: kind({
    schema: z.object({
      collaboration: word,
      path,
      notes: z.array(z.object({ who: word, item: word })).min(1),
    }),
    preference: 'notes',
    compose: ({ collaboration, path: to, notes }) => {
      const items = [...new Set(notes.map(({ item }) => item))];
      const people = [...new Set(notes.map(({ who }) => who))];
      const count = notes.length === 1 ? 'a note' : `${notes.length} notes`;
      const by = people.length <= 3 ? people.join(', ') : `${people.length} people`;
      const on = items.length <= 3 ? items.join(', ') : `${items.length} items`;
      return {
        subject: `${notes.length === 1 ? 'A note' : `${notes.length} notes`} on ${on}`,
        sentence: `${by} wrote ${count} on ${on} in ${collaboration}.`,
        link: { label: notes.length === 1 ? 'Read it' : 'Read them', path: to },
        why: 'You get this message because you made or lead these, or wrote in the same thread; it comes at most once an hour.',
      };
    },
  }),
  run: kind({
    schema: z.object({
      collaboration: word,
      item: word,
      outcome: z.enum(['finished', 'failed']),
      path,
    }),
    preference: 'run',
    compose: ({ collaboration, item, outcome, path: to }) => ({
      subject: `${item} ${outcome === 'finished' ? 'has finished' : 'failed'}`,
      sentence: `${item} in ${collaboration} ${outcome === 'finished' ? 'has finished' : 'failed, and its page says why'}.`,
      link: { label: outcome === 'finished' ? 'See the result' : 'See why', path: to },
      why: 'You get this message because you started it and it took over a minute.',
    }),
  }),
  'sign-off-asked': kind({
    schema: z.object({ ...aboutItem, what: z.enum(['freeze', 'agree']) }),
    preference: 'sign-off',
    compose: ({ collaboration, who, item, path: to, what }) => ({
      subject: `${who} asks you to ${what === 'freeze' ? 'freeze' : 'agree to'} ${item}`,
      sentence: `${who} asks you to ${what === 'freeze' ? 'freeze' : 'agree to the release of'} ${item} in ${collaboration}.`,
      link: { label: 'Look at it', path: to },
      why: `${member(collaboration)} who may do so.`,
    }),
  }),
  'sign-off-given': kind({
    schema: z.object({ ...aboutItem, what: z.enum(['freeze', 'agree']) }),
    preference: 'sign-off',
    compose: ({ collaboration, who, item, path: to, what }) => ({
      subject: `${who} ${what === 'freeze' ? 'froze' : 'agreed to'} ${item}`,
      sentence: `${who} ${what === 'freeze' ? 'froze' : 'agreed to the release of'} ${item} in ${collaboration}.`,
      link: { label: 'Look at it', path: to },
      why: 'You get this message because you asked for it.',
    }),
  }),
  'release-published': kind({
    schema: z.object(aboutItem),
    preference: 'release',
    compose: ({ collaboration, who, item, path: to }) => ({
      subject: `${item} is published`,
      sentence: `${who} published ${item} of ${collaboration}: anybody may read it now.`,
      link: { label: 'Read it', path: to },
      why: `${member(collaboration)}.`,
    }),
  }),
  'release-withdrawn': kind({
    schema: z.object({ ...aboutItem, reason: z.string().min(1).max(2000) }),
    preference: 'release',
    compose: ({ collaboration, who, item, path: to, reason }) => ({
      subject: `${item} is withdrawn`,
      sentence: `${who} withdrew ${item} of ${collaboration}: ${reason}`,
      link: { label: 'See what remains', path: to },
      why: `${member(collaboration)}.`,
    }),
  }),
  'guest-link-ending': kind({
    schema: z.object({ collaboration: word, item: word, path, endsAt: z.coerce.date() }),
    preference: 'guest-link',
    compose: ({ collaboration, item, path: to, endsAt }) => ({
      subject: `The guest link to ${item} ends on ${day.format(endsAt)}`,
      sentence: `Your guest link to ${item} in ${collaboration} ends on ${time.format(endsAt)} (UTC).`,
      link: { label: 'Give it more time, or let it end', path: to },
      why: 'You get this message because you gave the link.',
    }),
  }),
  /** The deletion of a collaboration: asked for, taken back, or done. */
  departure: kind({
    schema: z.object({
      collaboration: word,
      who: word,
      path,
      what: z.enum(['asked', 'cancelled', 'deleted']),
      dueAt: z.coerce.date(),
    }),
    preference: null,
    compose: ({ collaboration, who, path: to, what, dueAt }) => {
      if (what === 'deleted') {
        return {
          subject: `${collaboration} was deleted`,
          sentence: `${collaboration} was deleted with everything in it, as ${who} had asked.`,
          link: { label: 'Your other collaborations', path: to },
          why: `You get this message because you were a member of ${collaboration}.`,
        };
      }
      const isAsked = what === 'asked';
      return {
        subject: isAsked
          ? `${collaboration} will be deleted on ${day.format(dueAt)}`
          : `${collaboration} stays`,
        sentence: isAsked
          ? `${who} asked for ${collaboration} to be deleted, with everything in it, on ${time.format(dueAt)} (UTC).`
          : `${who} took the deletion of ${collaboration} back: nothing changes.`,
        link: { label: isAsked ? 'See what is there' : 'Go there', path: to },
        notes: isAsked ? ['Until then any owner can take it back in the settings.'] : undefined,
        why: `${member(collaboration)}.`,
      };
    },
  }),
  'password-reset': kind({
    schema: z.object({ path, expiresAt: z.coerce.date() }),
    preference: null,
    compose: ({ path: to, expiresAt }) => ({
      subject: 'Set a new password for Rarebound',
      sentence: 'Somebody, probably you, asked to set a new password for your account.',
      link: { label: 'Set a new password', path: to },
      notes: [`The link works once, until ${time.format(expiresAt)} (UTC).`],
      why: 'You get this message because your address was typed on the page of sign-in. If that was not you, do nothing: your password stays as it is.',
    }),
  }),
  /** A way into the account was changed: whoever did not do it must hear of it. */
  'account-changed': kind({
    schema: z.object({
      what: z.enum(Object.keys(changes) as [Change, ...Change[]]),
      at: z.coerce.date(),
    }),
    preference: null,
    compose: ({ what, at }) => ({
      subject: `${changes[what].subject} on Rarebound`,
      sentence: `${changes[what].sentence} on ${time.format(at)} (UTC). If that was you, there is nothing to do.`,
      link: { label: 'It was not me: set a new password', path: '/reset' },
      why: 'You get this message because it concerns how one signs in to your account.',
    }),
  }),
  'sign-in-link': kind({
    schema: z.object({ path, expiresAt: z.coerce.date() }),
    preference: null,
    compose: ({ path: to, expiresAt }) => ({
      subject: 'Your link to sign in to Rarebound',
      sentence: 'Somebody, probably you, asked for a link to sign in.',
      link: { label: 'Sign in', path: to },
      notes: [`The link works once, until ${time.format(expiresAt)} (UTC).`],
      why: 'You get this message because your address was typed on the page of sign-in. If that was not you, do nothing.',
    }),
  }),
} as const;

export type MailKindName = keyof typeof mailKinds;
export type MailData<Kind extends MailKindName> = Parameters<
  (typeof mailKinds)[Kind]['compose']
>[0];

export const isMailKind = (name: string): name is MailKindName => Object.hasOwn(mailKinds, name);
