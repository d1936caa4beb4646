'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { pick } from '@/components/hooks/change';
import { useEditing } from '@/components/hooks/use-editing';
import { changeSettings, type SettingsPart } from '@/components/hooks/use-settings';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { useMoment } from '@/components/ui/time-zone';
import type { LeavingView } from '@/lib/schemas/leaving';
import type { FailedMessage } from '@/lib/schemas/mail';
import type { ChangeSettings, SettingsView } from '@/lib/schemas/settings';
import { ArchivePart } from './archive-part';
import { FailedMail } from './failed-mail';
import { LeavingPart } from './leaving-part';
import { PlaceForm } from './place-form';
import { RulesForm } from './rules-form';
import { partOf, rulesKey, settingsWords, storedOf } from './settings-parts';

interface SettingsScreenProps {
  collaboration: string;
  initial: SettingsView;
  analyses: { key: string; name: string }[];
  /** Names of time zones, as the server knows them. */
  zones: string[];
  /** Null for whom they do not concern. */
  failed: FailedMessage[] | null;
  /** Null for whoever is no owner. */
  leaving: LeavingView | null;
}

/** What owners settle for everybody; other members read it. */
export function SettingsScreen(props: SettingsScreenProps) {
  const { collaboration, initial, analyses, zones, failed, leaving } = props;
  const [settings, setSettings] = useState(initial);
  const [refusal, setRefusal] = useState<string | null>(null);
  const [saved, setSaved] = useState<string | null>(null);
  const router = useRouter();
  const moment = useMoment();
  const editing = useEditing<SettingsPart>({});
  const [asked, setAsked] = useState<{ change: ChangeSettings; words: string } | null>(null);
  const store = async (opened: SettingsPart, { change, words }: NonNullable<typeof asked>) => {
    setRefusal(null);
    setSaved(null);
    setAsked({ change, words });
    editing.begin(opened);
    try {
      await editing.attempt(partOf(change), async () => {
        const next = await changeSettings(settings.slug, opened, change);
        // Only what was saved: another form keeps what it was opened with.
        setSettings({ ...settings, ...storedOf(next), ...pick(next, opened as SettingsView) });
        setSaved(words);
        if (next.slug !== collaboration) router.replace(`/${next.slug}/settings`);
        else router.refresh();
      });
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  const save = (change: ChangeSettings, words: string) =>
    store(pick(settings, partOf(change) as SettingsView), { change, words });
  const { can, archivedAt } = settings;
  const shared = { settings, save };
  return (
    <>
      <PageTitle
        title="Settings"
        context={can.manage ? 'For everybody in the collaboration' : 'An owner can change them'}
        actions={
          can.manage && (
            <LinkButton href={`/${settings.slug}/settings/work`}>Queue and workers</LinkButton>
          )
        }
      />
      <div className="grid gap-3 empty:hidden [&:not(:empty)]:mb-5">
        {archivedAt !== null && (
          <Notice tone="warn" icon="lock" title={`Archived since ${moment(archivedAt, 'day')}.`}>
            Everything can be read and exported; nothing changes.
          </Notice>
        )}
        <ChangedNotice
          editing={editing}
          words={(part) => settingsWords(part, (at) => moment(at, 'day'))}
          onTake={(now) => setSettings({ ...settings, ...now })}
          onKeep={() => asked && void store(editing.opened(), asked)}
        />
        {refusal !== null && (
          <Notice tone="bad" title="Nothing was saved." isAnnounced>
            {refusal}
          </Notice>
        )}
        {saved !== null && <Notice tone="ok" title={saved} isAnnounced />}
      </div>
      <div className="grid gap-x-14 gap-y-10 lg:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="Name and dates" />
          <PlaceForm
            key={`${settings.name} ${settings.slug} ${settings.timeZone}`}
            {...shared}
            zones={zones}
          />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Rules" context="what new work begins with" />
          <RulesForm key={rulesKey(settings)} {...shared} analyses={analyses} />
        </section>
        {failed !== null && (
          <section className="min-w-0">
            <SectionOpener title="Mail that did not arrive" />
            <FailedMail collaboration={settings.slug} initial={failed} />
          </section>
        )}
        {can.manage && (
          <section className="min-w-0">
            <SectionOpener title={archivedAt === null ? 'Archive' : 'Open again'} />
            <ArchivePart {...shared} />
          </section>
        )}
        {leaving !== null && <LeavingPart collaboration={settings.slug} initial={leaving} />}
      </div>
    </>
  );
}
