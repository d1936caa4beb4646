import { personRoute } from '@/app/api/v1/handler';
import { collectOwnData } from '@/lib/services/leaving/own-data';

/** What is stored about whoever asks, as an attachment. */
export const GET = personRoute({ scope: 'read', sessionOnly: true }, async ({ person }) => {
  const data = await collectOwnData(person);
  return new Response(`${JSON.stringify(data, null, 1)}\n`, {
    headers: {
      'Content-Type': 'application/json; charset=utf-8',
      'Content-Disposition': 'attachment; filename="rarebound-my-data.json"',
    },
  });
});
