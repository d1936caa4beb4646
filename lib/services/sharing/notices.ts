import type { Actor } from '@/lib/access/actor';
import type { Overview } from '@/lib/schemas/overview';
import { listShares } from './shares';

const dayOf = (moment: string) => moment.slice(0, 10);

/** How long a withdrawal that has begun is still news. */
const NEWS_MS = 30 * 86_400_000;

const isNews = (moment: string) => new Date(moment).getTime() > Date.now() - NEWS_MS;

/** Offers that wait for an answer, and surveys that their owners take back. */
export async function sharingNotices(actor: Actor): Promise<Overview['waiting']> {
  const { shares } = await listShares(actor);
  const base = `/${actor.collaboration}/surveys`;
  return shares
    .filter(({ direction }) => direction === 'received')
    .flatMap(({ state, survey, other, note, scope, withdrawnFrom, withdrawnWhy }) => {
      if (state === 'offered') {
        const what = scope === 'maps' ? 'Its maps only' : 'The whole survey';
        return [
          {
            fact: `${other} offers ${survey.name}`,
            detail: note === '' ? what : `${what}: ${note}`,
            verb: 'Decide',
            address: `${base}#sharing`,
          },
        ];
      }
      const isEnding = state === 'ending' || state === 'withdrawn';
      if (!isEnding || withdrawnFrom === null || !isNews(withdrawnFrom)) return [];
      const verb = state === 'ending' ? 'takes' : 'took';
      return [
        {
          fact: `${other} ${verb} ${survey.name} back on ${dayOf(withdrawnFrom)}`,
          detail: `${withdrawnWhy}. Earlier runs stand; nothing new may use it`,
          verb: 'Look',
          address: survey.slug === null ? `${base}#sharing` : `${base}/${survey.slug}`,
        },
      ];
    });
}
