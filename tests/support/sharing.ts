import { GET as listShares } from '@/app/api/v1/collaborations/[collaboration]/shares/route';
import { POST as offer } from '@/app/api/v1/collaborations/[collaboration]/surveys/[survey]/shares/route';
import type { RouteHandler } from '@/app/api/v1/handler';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { type ShareView, shareSchema, sharesSchema } from '@/lib/schemas/sharing';
import {
  bearer,
  call,
  createCollaborationWith,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
} from './people';

/** A collaboration that gives, takes or looks on, with one person a role; its owner asks. */
export interface Side {
  collaboration: TestCollaboration;
  people: Record<Role, TestPerson>;
  headers: Record<string, string>;
  code: string;
}

export const ask = (
  side: Side,
  handler: RouteHandler,
  params: Record<string, string> = {},
  body?: unknown,
  given: { method?: string; by?: Record<string, string>; path?: string } = {},
) =>
  call(handler, {
    method: given.method ?? (body === undefined ? 'GET' : 'POST'),
    params: { collaboration: side.collaboration.slug, ...params },
    headers: given.by ?? side.headers,
    path: given.path,
    body,
  });

export const post = (side: Side, handler: RouteHandler, params: Record<string, string> = {}) =>
  ask(side, handler, params, undefined, { method: 'POST' });

export const sharesOf = async (side: Side) =>
  sharesSchema.parse(await (await ask(side, listShares)).json());

export async function buildSide(name: string): Promise<Side> {
  const { collaboration, people } = await createCollaborationWith(roleSchema.options, { name });
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const side = { collaboration, people, headers, code: '' };
  return { ...side, code: (await sharesOf(side)).code };
}

export const terms = {
  scope: 'whole',
  note: 'For the joint paper',
  attribution: 'Data of the Giver survey, Team Giver 2026',
};

/** An offer that stands; a refusal fails the test. */
export async function offerTo(
  from: Side,
  survey: string,
  to: Side,
  given: object = {},
): Promise<ShareView> {
  const body = { ...terms, code: to.code, ...given };
  const response = await ask(from, offer, { survey }, body);
  if (response.status !== 201) throw new Error(`refused: ${await response.text()}`);
  return shareSchema.parse(await response.json());
}
