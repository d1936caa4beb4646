import type { MailPreference } from './mail';

/** What each kind brings, as the page of preferences says it. */
export const mailPreferenceWords: Record<MailPreference, { label: string; hint: string }> = {
  mention: { label: 'Mentions', hint: 'somebody names you in a note' },
  notes: { label: 'Notes on what is yours', hint: 'at most one message an hour' },
  run: { label: 'Runs', hint: 'one that you started and that took over a minute has ended' },
  'sign-off': { label: 'Freezing and agreement', hint: 'asked of you, or given to you' },
  release: { label: 'Releases', hint: 'published or withdrawn' },
  'guest-link': { label: 'Guest links', hint: 'one that you gave ends in three days' },
};
