import type { Metadata } from 'next';
import { cookies } from 'next/headers';
import { notFound } from 'next/navigation';
import { Entrance, EntranceTitle } from '@/components/people/entrance';
import { StopMail } from '@/components/settings/stop-mail';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { mailPreferenceWords } from '@/lib/schemas/mail-words';
import { readStopLink } from '@/lib/services/mail';

export const metadata: Metadata = { title: 'Stop messages', referrer: 'no-referrer' };

export default async function StopMailPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const asked = readStopLink(token);
  if (!asked) notFound();
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <Entrance theme={theme}>
      <EntranceTitle>Stop messages</EntranceTitle>
      <div className="mt-4">
        <StopMail token={token} label={mailPreferenceWords[asked.kind].label} />
      </div>
    </Entrance>
  );
}
