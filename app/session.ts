import { cookies, headers } from 'next/headers';
import { notFound, redirect } from 'next/navigation';
import { cache } from 'react';
import { type Actor, actorIn, type KnownPerson } from '@/lib/access/actor';
import { findPersonOfSession, readSessionCookie, sessionCookieName } from '@/lib/access/sessions';
import { NotFound } from '@/lib/errors';
import type { Me } from '@/lib/schemas/people';
import { getMe } from '@/lib/services/people';

/** Whoever is signed in, or null; looked up once a page. */
export const currentPerson = cache(async (): Promise<KnownPerson | null> => {
  const claims = await readSessionCookie((await cookies()).get(sessionCookieName())?.value);
  return claims && findPersonOfSession(claims);
});

/** Where whoever is signed in works; null for a visitor. */
export async function currentCollaborations(): Promise<Me['collaborations'] | null> {
  const person = await currentPerson();
  return person && (await getMe(person)).collaborations;
}

/** The address of the page, as proxy.ts notes it. */
async function currentAddress(otherwise: string): Promise<string> {
  return (await headers()).get('x-address') ?? otherwise;
}

/** The signed-in person; anybody else is sent to sign in and comes back to this page. */
export async function requirePerson(otherwise = '/'): Promise<KnownPerson> {
  const person = await currentPerson();
  if (person) return person;
  redirect(`/sign-in?next=${encodeURIComponent(await currentAddress(otherwise))}`);
}

/** The signed-in person as a member of the collaboration; for others there is no such page. */
export const currentActor = cache(async (slug: string): Promise<Actor> => {
  const person = await requirePerson(`/${slug}`);
  try {
    return await actorIn(person, slug);
  } catch (error) {
    if (error instanceof NotFound) notFound();
    throw error;
  }
});
