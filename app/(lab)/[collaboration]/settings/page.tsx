import type { Metadata } from 'next';
import { currentActor } from '@/app/session';
import { SettingsScreen } from '@/components/settings/settings-screen';
import { may } from '@/lib/access/permissions';
import { listAnalyses } from '@/lib/services/analyses';
import { getLeaving } from '@/lib/services/leaving/exports';
import { listFailedMessages } from '@/lib/services/mail';
import { getSettings } from '@/lib/services/settings';

export const metadata: Metadata = { title: 'Settings' };

/** All that the server knows, the usual one first and the chosen one among them. */
const zonesWith = (chosen: string) => [
  ...new Set(['UTC', chosen, ...Intl.supportedValuesOf('timeZone')]),
];

export default async function SettingsPage({
  params,
}: {
  params: Promise<{ collaboration: string }>;
}) {
  const actor = await currentActor((await params).collaboration);
  const [settings, { analyses }, failed, leaving] = await Promise.all([
    getSettings(actor),
    listAnalyses(actor),
    may(actor, 'read-audit') ? listFailedMessages(actor) : null,
    may(actor, 'manage-collaboration') ? getLeaving(actor) : null,
  ]);
  return (
    <SettingsScreen
      collaboration={actor.collaboration}
      initial={settings}
      analyses={analyses.map(({ key, name }) => ({ key, name }))}
      zones={zonesWith(settings.timeZone)}
      failed={failed?.messages ?? null}
      leaving={leaving}
    />
  );
}
