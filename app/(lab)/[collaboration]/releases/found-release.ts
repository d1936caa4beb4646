import { notFound } from 'next/navigation';
import type { Actor } from '@/lib/access/actor';
import { NotFound } from '@/lib/errors';
import { getRelease } from '@/lib/services/releases/describe';

/** The release of an address; for anything else there is no such page. */
export async function foundRelease(actor: Actor, key: string) {
  try {
    return await getRelease(actor, key);
  } catch (reason) {
    if (reason instanceof NotFound) notFound();
    throw reason;
  }
}
