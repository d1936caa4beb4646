import type { StateKind } from '@/components/ui/state-mark';
import type { ShareView } from '@/lib/schemas/sharing';

export const scopeWords = { whole: 'the whole survey', maps: 'its maps only' } as const;

/** The code in groups of four, as it is read out. */
export const spacedCode = (code: string): string => code.replace(/(.{4})(?=.)/g, '$1-');

/** What an offer holds, in numbers. */
export function holdsWords({ holds, scope }: Pick<ShareView, 'holds' | 'scope'>): string | null {
  if (holds === null) return null;
  const { targets, maps, curves } = holds;
  const parts = [
    targets === 1 ? '1 target' : `${targets} targets`,
    maps === 1 ? '1 map' : `${maps} maps`,
    ...(scope === 'whole' ? [curves === 1 ? '1 curve' : `${curves} curves`] : []),
  ];
  return parts.join(', ');
}

/** Where an offer stands, as a mark and as words; `dayOf` writes the day of a moment. */
export function stateWords(
  share: ShareView,
  dayOf: (moment: string) => string,
): { kind: StateKind; words: string } {
  const { state, expiresAt, decidedBy, decidedAt, decidedWhy, withdrawnFrom, withdrawnWhy } = share;
  const by = decidedBy === null ? '' : ` by ${decidedBy}`;
  const on = decidedAt === null ? '' : ` on ${dayOf(decidedAt)}`;
  const day = withdrawnFrom === null ? '' : dayOf(withdrawnFrom);
  switch (state) {
    case 'offered':
      return { kind: 'waiting', words: `Waits for an answer until ${dayOf(expiresAt)}` };
    case 'expired':
      return { kind: 'stopped', words: `Expired on ${dayOf(expiresAt)} without an answer` };
    case 'refused':
      return { kind: 'stopped', words: `Refused${by}${on}: ${decidedWhy}` };
    case 'taken-back':
      return { kind: 'stopped', words: `Taken back on ${day}: ${withdrawnWhy}` };
    case 'accepted':
      return { kind: 'ok', words: `Accepted${by}${on}` };
    case 'ending':
      return { kind: 'warn', words: `In use until ${day}, then withdrawn: ${withdrawnWhy}` };
    case 'withdrawn':
      return { kind: 'bad', words: `Withdrawn on ${day}: ${withdrawnWhy}` };
  }
}
