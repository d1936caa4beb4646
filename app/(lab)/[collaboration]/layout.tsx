import { cookies } from 'next/headers';
import type { ReactNode } from 'react';
import { currentActor, requirePerson } from '@/app/session';
import { FigureFrame } from '@/components/figures/figure-frame';
import { LabBar, LabFoot } from '@/components/people/lab-bar';
import type { BeginAction } from '@/components/search/entries';
import { SkipLink } from '@/components/ui/skip-link';
import { readTheme, THEME_COOKIE } from '@/components/ui/theme';
import { TimeZoneProvider } from '@/components/ui/time-zone';
import { type Action, may } from '@/lib/access/permissions';
import { getMe } from '@/lib/services/people';
import { timeZoneOf } from '@/lib/services/settings';

/** What can be begun from the search, each with the permission that its page asks for. */
const beginnings: (BeginAction & { needs: Action })[] = [
  { label: 'Add a survey', path: 'surveys/new', needs: 'create-survey' },
  { label: 'Combine surveys', path: 'surveys/combine', needs: 'combine' },
  { label: 'New population', path: 'populations/new', needs: 'save-population' },
  { label: 'New analysis', path: 'analyses/new', needs: 'run-analysis' },
  { label: 'New forecast', path: 'forecasts/new', needs: 'run-analysis' },
  { label: 'Invite a person', path: 'people', needs: 'invite' },
  { label: 'Make an API token', path: 'me/tokens', needs: 'create-token' },
];

/** A chart without a caption of its own says its sentence instead. */
const noCaption: string[] = [];

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
  const [zone, me] = await Promise.all([timeZoneOf(actor), getMe(person)]);
  const theme = readTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <TimeZoneProvider zone={zone}>
      <SkipLink />
      <LabBar
        me={me}
        current={actor.collaboration}
        theme={theme}
        actions={beginnings
          .filter(({ needs }) => may(actor, needs, { isOwn: true }))
          .map(({ label, path }) => ({ label, path }))}
      />
      {/* As high as the window: the foot of the page stays out of sight while its content comes. */}
      <main
        id="main"
        className="mx-auto min-h-[calc(100dvh-7rem)] max-w-[1440px] px-[22px] lg:px-10 print:min-h-0"
      >
        <FigureFrame
          collaboration={actor.collaboration}
          file={actor.collaboration}
          title={actor.collaboration}
          label={actor.collaboration}
          caption={noCaption}
        >
          {children}
        </FigureFrame>
      </main>
      <LabFoot collaboration={actor.collaboration} />
    </TimeZoneProvider>
  );
}
