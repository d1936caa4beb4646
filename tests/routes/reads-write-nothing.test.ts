import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { closeDatabase } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, sessionCookieOf, tokenOf, webAddress } from '../support/people';
import { buildWholeLab, type WholeLab } from '../support/whole-lab';
import { askLab, type LabRoute, labRoutes } from '../support/whole-lab-requests';

const { query } = withDatabase();

const reading = labRoutes.filter(({ route }) => route.method === 'get');
let lab: WholeLab;
let token: Record<string, string>;
let session: Record<string, string>;

const ask = (route: LabRoute) =>
  askLab(route, {
    slug: lab.collaboration.slug,
    ids: lab.ids,
    headers: route.route.access === 'session' ? session : token,
  });

/** From now on every connection of the product refuses to write. */
async function takeWrites(answer: 'on' | 'off'): Promise<void> {
  const [{ name }] = await query<{ name: string }>('select current_database() as name');
  await query(`alter database "${name}" set default_transaction_read_only = ${answer}`);
  await closeDatabase();
}

beforeAll(async () => {
  lab = await buildWholeLab(1, 'owner');
  token = bearer(await tokenOf(lab.people.owner, lab.collaboration));
  const { cookie } = await sessionCookieOf(lab.people.owner);
  session = { cookie, origin: webAddress() };
  // When a token or a session was last used is written once a minute, by whatever comes first.
  for (const access of ['read', 'session']) {
    const first = reading.find(({ route }) => route.access === access);
    if (first) await ask(first);
  }
  await takeWrites('on');
});
afterAll(() => takeWrites('off'));

/** What leaves as a file has an entry in the log, or does not leave. */
const isLogged = ({ name }: LabRoute) => /\/exports\/\{\w+\}|audit\/export$/.test(name);
const named = (routes: LabRoute[]) => routes.map((route) => [route.name, route] as const);

describe('in a database that takes no writes', () => {
  it.each(named(reading.filter((route) => !isLogged(route))))('answers %s', async (_, route) => {
    const response = await ask(route);
    expect(response.status, await response.clone().text()).toBeLessThan(500);
  });

  it.each(named(reading.filter(isLogged)))(
    'lets no file go without its entry: %s',
    async (_, route) => {
      expect((await ask(route)).status).toBe(500);
    },
  );
});
