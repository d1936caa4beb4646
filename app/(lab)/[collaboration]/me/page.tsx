import type { Metadata } from 'next';
import { currentActor, requirePerson } from '@/app/session';
import { MeScreen } from '@/components/settings/me/me-screen';
import { getMailPreferences } from '@/lib/services/mail';
import { listSessions } from '@/lib/services/sessions';

export const metadata: Metadata = { title: 'You' };

export default async function MePage({ params }: { params: Promise<{ collaboration: string }> }) {
  await currentActor((await params).collaboration);
  const person = await requirePerson();
  const [{ sessions }, mail] = await Promise.all([
    listSessions(person),
    getMailPreferences(person),
  ]);
  return <MeScreen name={person.personName} email={person.email} sessions={sessions} mail={mail} />;
}
