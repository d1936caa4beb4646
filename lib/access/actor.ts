import { QueryTypes } from 'sequelize';
import { NotFound } from '@/lib/errors';
import { type Role, slugSchema } from '@/lib/schemas/common';
import { database } from '@/models';

export type Scope = 'read' | 'write' | 'run';
export const EVERY_SCOPE: readonly Scope[] = ['read', 'write', 'run'];

/** Somebody who is signed in, or who holds a token; not yet in any collaboration. */
export interface KnownPerson {
  personId: string;
  personName: string;
  email: string;
  via: 'session' | 'token';
  scopes: Scope[];
  sessionId?: string;
  tokenId?: string;
  /** A token reaches one collaboration and no other. */
  tokenCollaborationId?: string;
  /** Where the request came from, as far as that can be believed; a page that is read has none. */
  address?: string;
}

/** A person within one collaboration: what every service is given. */
export interface Actor {
  personId: string;
  personName: string;
  email: string;
  collaborationId: string;
  /** The slug in addresses. */
  collaboration: string;
  roles: Role[];
  via: 'session' | 'token';
  scopes: Scope[];
  sessionId?: string;
  tokenId?: string;
  address?: string;
  /** Nothing in the collaboration changes until an owner opens it again. */
  isArchived?: boolean;
}

/**
 * The person as a member of a collaboration, with the roles of this moment.
 *
 * @throws NotFound for a collaboration that is absent, that the person is no member of or
 *   suspended in, or that the token was not made for: these are not told apart
 */
export async function actorIn(person: KnownPerson, slug: string): Promise<Actor> {
  if (!slugSchema.safeParse(slug).success) throw new NotFound('collaboration');
  const rows = await database().query<{
    id: string;
    slug: string;
    roles: Role[];
    isArchived: boolean;
  }>(
    `select c.id, c.slug, m.roles, c.archived_at is not null as "isArchived"
       from collaboration c join member m on m.collaboration_id = c.id
      where c.slug = $1 and m.person_id = $2 and m.suspended_at is null`,
    { bind: [slug, person.personId], type: QueryTypes.SELECT },
  );
  const found = rows[0];
  const isOutOfReach =
    person.tokenCollaborationId !== undefined && person.tokenCollaborationId !== found?.id;
  if (!found || isOutOfReach) throw new NotFound('collaboration');
  return {
    personId: person.personId,
    personName: person.personName,
    email: person.email,
    collaborationId: found.id,
    collaboration: found.slug,
    roles: found.roles,
    via: person.via,
    scopes: person.scopes,
    sessionId: person.sessionId,
    tokenId: person.tokenId,
    address: person.address,
    isArchived: found.isArchived,
  };
}
