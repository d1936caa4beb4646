import { redirect } from 'next/navigation';
import { requirePerson } from '@/app/session';
import { getMe } from '@/lib/services/people';

/** Straight to the person's collaboration; somebody without one starts one. */
export default async function FrontPage() {
  const { collaborations } = await getMe(await requirePerson('/'));
  redirect(collaborations.length === 0 ? '/welcome' : `/${collaborations[0].slug}`);
}
