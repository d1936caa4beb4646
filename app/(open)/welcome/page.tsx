import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { requirePerson } from '@/app/session';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { WelcomeForm } from '@/components/people/welcome-form';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';

export const metadata: Metadata = { title: 'Start a collaboration' };

export default async function WelcomePage() {
  const person = await requirePerson('/welcome');
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Start a collaboration</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        {person.personName}, you become its owner: you invite the others and say what each may do.
        What is in it is visible to its members only.
      </p>
      <WelcomeForm />
    </Entrance>
  );
}
