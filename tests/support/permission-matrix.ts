import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { RouteHandler } from '@/app/api/v1/handler';
import { type Action, may, type Standing } from '@/lib/access/permissions';
import { makeToken } from '@/lib/access/tokens';
import { type Role, roleSchema } from '@/lib/schemas/common';
import { database } from '@/models';
import { withDatabase } from './database';
import {
  addMember,
  bearer,
  call,
  createCollaborationWith,
  createPerson,
  sessionCookieOf,
  type TestCollaboration,
  type TestPerson,
  tokenOf,
  webAddress,
} from './people';

const roles = roleSchema.options;

export interface Team {
  collaboration: TestCollaboration;
  people: Record<Role, TestPerson>;
  memberIds: Record<Role, string>;
}

/** A handler, and the action of the permission table that it stands for. */
export interface Cell {
  name: string;
  handler: RouteHandler;
  method: string;
  action: Action;
  scope: 'read' | 'write' | 'run';
  /** Status for whoever may. */
  success: number;
  standing?: Standing;
  /** Made anew for each request, within the team; gets the person who asks. */
  prepare?: (
    team: Team,
    personId: string,
  ) => Promise<{ params?: Record<string, string>; body?: unknown }>;
}

/**
 * Holds every cell to the permission table: each role by token and by session, nobody, ended tokens,
 * a suspended person, an outsider, missing scopes, and a token of another collaboration.
 */
export function describePermissions(cells: readonly Cell[]): void {
  const { query } = withDatabase();
  let team: Team;
  let otherTeam: Team;

  beforeAll(async () => {
    team = await createCollaborationWith(roles);
    otherTeam = await createCollaborationWith(roles);
  });
  beforeEach(async () => {
    await database().query('delete from rate_limit');
  });

  async function ask(cell: Cell, personId: string, headers: Record<string, string>) {
    const { params, body } = (await cell.prepare?.(team, personId)) ?? {};
    return call(cell.handler, {
      method: cell.method,
      params: { collaboration: team.collaboration.slug, ...params },
      headers,
      body,
    });
  }

  describe.each(cells)('$method $name', (cell) => {
    it.each(roles)('follows the permission table for a token of the %s', async (role) => {
      const person = team.people[role];
      const headers = bearer(await tokenOf(person, team.collaboration));
      const isAllowed = may({ roles: [role] }, cell.action, cell.standing);
      const response = await ask(cell, person.id, headers);
      expect(response.status).toBe(isAllowed ? cell.success : 403);
      if (!isAllowed) expect((await response.json()).code).toBe('not-allowed');
    });

    it.each(roles)('follows the permission table for a session of the %s', async (role) => {
      const person = team.people[role];
      const { cookie } = await sessionCookieOf(person);
      const headers = { cookie, origin: webAddress() };
      const isAllowed = may({ roles: [role] }, cell.action, cell.standing);
      expect((await ask(cell, person.id, headers)).status).toBe(isAllowed ? cell.success : 403);
    });

    it('answers 401 to nobody, and to a token that has expired, was revoked or is made up', async () => {
      const { owner } = team.people;
      const ended = await tokenOf(owner, team.collaboration, ['read', 'write', 'run'], new Date());
      const revoked = await tokenOf(owner, team.collaboration);
      await query('update access_token set revoked_at = now() where ending = $1', [
        revoked.slice(-4),
      ]);
      const given = [{}, bearer(ended), bearer(revoked), bearer(makeToken()), bearer('nonsense')];
      for (const headers of given) {
        const response = await ask(cell, owner.id, headers);
        expect(response.status).toBe(401);
        expect(response.headers.get('www-authenticate')).toBe('Bearer realm="rarebound"');
      }
    });

    it('answers 401 to a person who is suspended', async () => {
      const person = await createPerson();
      await addMember(team.collaboration, person, ['owner']);
      const token = await tokenOf(person, team.collaboration);
      const { cookie } = await sessionCookieOf(person);
      await query('update person set suspended_at = now() where id = $1', [person.id]);
      for (const headers of [bearer(token), { cookie, origin: webAddress() }]) {
        expect((await ask(cell, person.id, headers)).status).toBe(401);
      }
    });

    it('answers 404 to an outsider, as for a collaboration that does not exist', async () => {
      const outsider = otherTeam.people.owner;
      const token = bearer(await tokenOf(outsider, otherTeam.collaboration));
      const { cookie } = await sessionCookieOf(outsider);
      for (const headers of [token, { cookie, origin: webAddress() }]) {
        const foreign = await ask(cell, team.people.owner.id, headers);
        const { params, body } = (await cell.prepare?.(team, team.people.owner.id)) ?? {};
        const absent = await call(cell.handler, {
          method: cell.method,
          params: { collaboration: 'no-such-team', ...params },
          headers,
          body,
        });
        expect([foreign.status, absent.status]).toEqual([404, 404]);
        expect(await foreign.text()).toBe(await absent.text());
        const names = (response: Response) => [...response.headers.keys()].sort();
        expect(names(foreign)).toEqual(names(absent));
      }
    });

    it('asks a token for its scope, and one of another collaboration finds nothing', async () => {
      const { owner } = team.people;
      const others = (['read', 'write', 'run'] as const).filter((scope) => scope !== cell.scope);
      const without = bearer(await tokenOf(owner, team.collaboration, others));
      expect((await ask(cell, owner.id, without)).status).toBe(403);
      const only = bearer(await tokenOf(owner, team.collaboration, [cell.scope]));
      expect((await ask(cell, owner.id, only)).status).toBe(cell.success);
      // The same person is an owner in both; the token is not.
      await query(
        'insert into member (collaboration_id, person_id, roles) values ($1, $2, $3) on conflict do nothing',
        [otherTeam.collaboration.id, owner.id, ['owner']],
      );
      const elsewhere = bearer(await tokenOf(owner, otherTeam.collaboration));
      expect((await ask(cell, owner.id, elsewhere)).status).toBe(404);
    });
  });
}
