import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { SignUpForm } from '@/components/people/sign-up-form';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';

export const metadata: Metadata = { title: 'Make an account' };

export default async function SignUpPage() {
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Make an account</EntranceTitle>
      <p className="mt-3 mb-6 text-[15px] text-ink3">
        Then start a collaboration of your own, or join one that invites you.
      </p>
      <SignUpForm />
    </Entrance>
  );
}
