import { describe, expect, it } from 'vitest';
import { foldSessions } from '@/components/settings/me/session-list';
import type { SessionView } from '@/lib/schemas/account';

const sessionsWith = (present: number, count: number): SessionView[] =>
  Array.from({ length: count }, (_, at) => ({
    id: `00000000-0000-4000-8000-0000000000${String(at).padStart(2, '0')}`,
    userAgent: null,
    createdAt: '2026-03-05T10:00:00.000Z',
    lastSeenAt: '2026-03-05T10:00:00.000Z',
    expiresAt: '2026-04-05T10:00:00.000Z',
    isThisOne: at === present,
  }));

describe('many sessions', () => {
  it('leave the newest five and the present one in sight', () => {
    const sessions = sessionsWith(8, 40);
    const { shown, rest } = foldSessions(sessions);
    expect(shown).toEqual([...sessions.slice(0, 5), sessions[8]]);
    expect(rest).toHaveLength(34);
  });

  it('are not folded while they are few', () => {
    expect(foldSessions(sessionsWith(0, 5)).rest).toEqual([]);
  });
});
