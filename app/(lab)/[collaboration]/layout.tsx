import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { currentActor, requirePerson } from '@/app/session';
import { LabBar, LabFoot } from '@/components/people/lab-bar';
import { SkipLink } from '@/components/ui/skip-link';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { getMe } from '@/lib/services/people';

export default async function LabLayout({
  children,
  params,
}: {
  children: ReactNode;
  params: Promise<{ collaboration: string }>;
}) {
  const { collaboration } = await params;
  const [actor, person] = await Promise.all([
    currentActor(collaboration),
    requirePerson(`/${collaboration}`),
  ]);
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <>
      <SkipLink />
      <LabBar me={await getMe(person)} current={actor.collaboration} theme={theme} />
      <main id="main" className="mx-auto max-w-[1440px] px-[22px] lg:px-10">
        {children}
      </main>
      <LabFoot collaboration={actor.collaboration} />
    </>
  );
}
