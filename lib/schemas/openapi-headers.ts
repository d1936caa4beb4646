import { z } from 'zod';
import { type ApiRoute, isPaged, takesIfMatch, takesKey } from './api-route';

const header = (description: string) => z.string().optional().describe(description);

const KEY =
  `A text of your own for this write, 1 to 200 characters. Sent again within 24 hours with the
same body it gets the first answer and stores nothing; with another body 422, while the first is under
way 409.`.replace(/\n/g, ' ');

/** The headers that a request may carry, as it is said of each operation. */
export function requestHeadersOf(one: ApiRoute, all: readonly ApiRoute[]) {
  const own = Object.entries(one.headers ?? {}).map(([name, { says }]) => [
    name,
    z.string().describe(says),
  ]);
  const known = {
    ...Object.fromEntries(own),
    ...(one.method === 'get' &&
      one.answer && { 'If-None-Match': header('An ETag that you hold: 304 when it is the same') }),
    ...(takesIfMatch(one, all) && {
      'If-Match': header('The ETag that was read: 412 when it has changed since'),
    }),
    ...(takesKey(one) && { 'Idempotency-Key': header(KEY) }),
  };
  return Object.keys(known).length > 0 ? z.object(known) : undefined;
}

const told = (description: string) => ({ description, schema: { type: 'string' as const } });

const budget = {
  RateLimit: told(
    'What is left of each limit: "token-requests";r=599;t=60 (r requests, t seconds)',
  ),
  'RateLimit-Policy': told('Each limit: "token-requests";q=600;w=60 (q requests in w seconds)'),
};

/** The headers that a good answer carries. */
export const answerHeadersOf = (one: ApiRoute) => ({
  ...(one.access !== 'open' && one.access !== 'session' && budget),
  ...(one.method === 'get' && one.answer && { ETag: told('Digest of the answer') }),
  ...(isPaged(one) && { Link: told('The next page, rel="next"; absent on the last') }),
  ...(takesKey(one) && {
    'Idempotency-Replayed': told('"true" on the answer of an earlier request'),
  }),
});

/** The headers of a refusal. */
export const refusalHeaders = {
  ...budget,
  'Retry-After': told('Seconds to wait: on 429 and 503'),
};
