import { beforeAll, describe, expect, it, vi } from 'vitest';
import type { ZodType } from 'zod';
import { parseQuery } from '@/lib/schemas/input';
import { database } from '@/models';
import { withDatabase } from '../support/database';
import { type Mutation, mutated, mutationsOf, shapeOf } from '../support/mutated-bodies';
import { bearer, sessionCookieOf, tokenOf, webAddress } from '../support/people';
import { buildWholeLab, type WholeLab } from '../support/whole-lab';
import { askLab, type LabRoute, labRoutes } from '../support/whole-lab-requests';

// What a schema takes although it is odd must not break the work behind it.
vi.stubEnv('MAIL_URL', 'smtp://127.0.0.1:1');
withDatabase();

let lab: WholeLab;
let token: Record<string, string>;
let session: Record<string, string>;

beforeAll(async () => {
  lab = await buildWholeLab(31);
  const { owner } = lab.people;
  token = bearer(await tokenOf(owner, lab.collaboration));
  session = { cookie: (await sessionCookieOf(owner)).cookie, origin: webAddress() };
});

async function statusOf(route: LabRoute, permission: LabRoute['permission']) {
  const headers = route.route.access === 'session' ? session : token;
  const response = await askLab(
    { ...route, permission },
    { slug: lab.collaboration.slug, ids: lab.ids, headers },
  );
  return { status: response.status, text: (await response.text()).slice(0, 300) };
}

const isTaken = (schema: ZodType, body: unknown) => schema.safeParse(body).success;
const named = (routes: LabRoute[]) => routes.map((route) => [route.name, route] as const);

describe('a body that its schema takes although it is odd', () => {
  it.each(named(labRoutes.filter(({ route }) => route.body)))(
    'breaks nothing: %s',
    async (_, route) => {
      await database().query('delete from rate_limit');
      const schema = route.route.body as ZodType;
      const body = route.permission.body?.(lab.ids) ?? {};
      const odd = mutationsOf(shapeOf(schema))
        .filter(({ isRefused }) => !isRefused)
        .map((mutation) => [mutation, mutated(body, mutation)] as const)
        .filter(([, one]) => isTaken(schema, one));
      for (const [{ path, what }, one] of odd) {
        const { status, text } = await statusOf(route, { ...route.permission, body: () => one });
        expect(status, `${path.join('.')}, ${what}: ${text}`).toBeLessThan(500);
      }
    },
  );
});

const asText = ({ path, value }: Mutation): [string, string] => [String(path[0]), String(value)];

describe('a question that its schema takes although it is odd', () => {
  it.each(named(labRoutes.filter(({ route }) => route.query)))(
    'breaks nothing: %s',
    async (_, route) => {
      await database().query('delete from rate_limit');
      const schema = route.route.query as ZodType;
      const asked = route.permission.query?.(lab.ids) ?? {};
      for (const mutation of mutationsOf(shapeOf(schema)).filter((one) => !one.isRefused)) {
        const [key, value] = asText(mutation);
        const query = { ...asked, [key]: value };
        const search = new URLSearchParams(query);
        let isRead = true;
        try {
          parseQuery(schema, search);
        } catch {
          isRead = false;
        }
        if (!isRead) continue;
        const { status, text } = await statusOf(route, {
          ...route.permission,
          query: () => query,
        });
        expect(status, `${key}, ${mutation.what}: ${text}`).toBeLessThan(500);
      }
    },
  );
});
