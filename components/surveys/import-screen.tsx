'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { ApiProblem, sentenceOf } from '@/components/hooks/api-problem';
import { useCoolingTables, useSurvey } from '@/components/hooks/use-surveys';
import {
  changeUpload,
  forgetMapping,
  sendUpload,
  storeUpload,
} from '@/components/hooks/use-uploads';
import { Button } from '@/components/ui/button';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { FileDrop } from '@/components/ui/file-drop';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import type { SurveyView } from '@/lib/schemas/surveys';
import type { UploadKindName } from '@/lib/schemas/uploads';
import { fileKinds } from './file-kinds';
import { FileNeeds } from './file-needs';
import type { IncomingEntry } from './incoming-entry';
import { describeMapSettings } from './map-setting-words';
import { MapSettingsDialog } from './map-settings-dialog';

/** Comes with the first file. */
const FileCheck = dynamic(async () => (await import('./file-check')).FileCheck);

/** Three steps on one page: files, check, store. Storing is one transaction a file. */
export function ImportScreen({
  collaboration,
  survey: initial,
  coolingName,
}: {
  collaboration: string;
  survey: SurveyView;
  /** Of the table with which curves become maps now. */
  coolingName: string | null;
}) {
  const { data: survey = initial, mutate } = useSurvey(collaboration, initial.slug, initial);
  const { data: tables, mutate: mutateTables } = useCoolingTables(collaboration);
  const [dialog, setDialog] = useState<{ table?: string } | null>(null);
  const [kind, setKind] = useState<UploadKindName>(
    survey.targets === 0 ? 'targets' : 'contrast-curves',
  );
  const [entries, setEntries] = useState<IncomingEntry[]>([]);
  const change = (key: string, part: Partial<IncomingEntry>) =>
    setEntries((all) => all.map((entry) => (entry.key === key ? { ...entry, ...part } : entry)));

  const read = async (entry: IncomingEntry) => {
    const { settings } = entry;
    change(entry.key, { state: 'reading', sent: 0, problem: null, failure: null, settings });
    const about = {
      kind: entry.kind,
      survey: entry.kind === 'cooling-tables' ? undefined : survey.slug,
      settings,
    };
    try {
      // What the server has is read again there.
      const upload = entry.upload
        ? await changeUpload(collaboration, entry.upload.id, entry.upload.settings, settings)
        : await sendUpload(collaboration, entry.file, about, (sent) => change(entry.key, { sent }));
      change(entry.key, { state: 'read', upload });
    } catch (reason) {
      const problem = reason instanceof ApiProblem ? reason : null;
      change(entry.key, {
        state: 'refused',
        upload: null,
        problem,
        failure: problem ? null : sentenceOf(reason),
      });
    }
  };

  const forget = async (entry: IncomingEntry, id: string) => {
    try {
      await forgetMapping(collaboration, survey.slug, id);
      await read(entry);
    } catch (reason) {
      change(entry.key, { failure: sentenceOf(reason) });
    }
  };

  const take = async (files: File[]) => {
    const fresh = files.map<IncomingEntry>((file, i) => ({
      key: `${Date.now()}-${i}-${file.name}`,
      file,
      kind,
      settings: {},
      state: 'reading',
      upload: null,
      problem: null,
      failure: null,
    }));
    setEntries((all) => [...all, ...fresh]);
    for (const entry of fresh) await read(entry);
  };

  const store = async (entry: IncomingEntry) => {
    if (!entry.upload) return;
    change(entry.key, { state: 'storing', failure: null });
    try {
      change(entry.key, {
        state: 'stored',
        upload: await storeUpload(collaboration, entry.upload.id),
      });
      await Promise.all([mutate(), mutateTables()]);
    } catch (reason) {
      change(entry.key, { state: 'read', failure: sentenceOf(reason) });
    }
  };

  const ready = entries.filter((entry) => entry.state === 'read');
  const stored = entries.filter((entry) => entry.state === 'stored');
  const storeAll = async () => {
    for (const entry of ready) await store(entry);
  };
  const chosen = fileKinds.find((choice) => choice.kind === kind) ?? fileKinds[0];
  const { cooling } = survey.mapSettings;
  const tableName =
    (cooling.kind === 'table' &&
      tables?.find((table) => table.id === cooling.coolingTableId)?.name) ||
    coolingName;
  const storedTable = stored.filter((entry) => entry.kind === 'cooling-tables').at(-1);
  const needsTargets = survey.targets === 0 && kind !== 'targets' && kind !== 'cooling-tables';
  return (
    <div className="flex flex-col gap-10">
      <section>
        <SectionOpener
          number={1}
          title="Files"
          context="one kind a file; a unit may stand in brackets after a column’s name"
        />
        <div className="mb-4">
          <ConsequenceSwitch<UploadKindName>
            label="What the files hold"
            value={kind}
            onChange={setKind}
            options={fileKinds.map((choice) => ({ value: choice.kind, label: choice.label }))}
          />
        </div>
        <div className="grid gap-x-14 gap-y-6 lg:grid-cols-2">
          <div className="flex min-w-0 flex-col gap-3">
            {needsTargets && (
              <Notice tone="warn" title="This survey has no targets yet.">
                Import the file of targets first: every other line is checked against their names.
              </Notice>
            )}
            <FileDrop
              label={`Drop files of ${chosen.label} here, or choose them`}
              hint={`${chosen.containers}; each may be gzipped (.gz); at most 512 MiB each`}
              maxBytes={512 * 2 ** 20}
              onFiles={(files) => void take(files)}
            />
            {kind === 'contrast-curves' && (
              <p className="text-ink2 text-note">
                They become maps with {describeMapSettings(survey.mapSettings, tableName)}.{' '}
                {survey.can.change && <TextAction onClick={() => setDialog({})}>Change</TextAction>}
              </p>
            )}
          </div>
          <div className="min-w-0">
            <FileNeeds kind={chosen} />
            <p className="mt-3 text-ink2 text-note">
              A table of whole systems belongs to no survey: it{' '}
              <Link
                className="underline underline-offset-3"
                href={`/${collaboration}/populations/new?from=systems`}
              >
                becomes a population
              </Link>
              .
            </p>
          </div>
        </div>
      </section>
      {entries.length > 0 && (
        <section>
          <SectionOpener
            number={2}
            title="Check"
            context={`each line was read${stored.length === 0 ? '; nothing is stored yet' : ''}`}
          />
          <div className="flex flex-col gap-8">
            {entries.map((entry) => (
              <FileCheck
                key={entry.key}
                entry={entry}
                onSettings={(settings) => void read({ ...entry, settings })}
                onForget={(id) => void forget(entry, id)}
                onStore={() => void store(entry)}
                onDrop={() => setEntries((all) => all.filter((other) => other.key !== entry.key))}
              />
            ))}
          </div>
        </section>
      )}
      {(ready.length > 0 || stored.length > 0) && (
        <section>
          <SectionOpener number={3} title="Store" context="all of a file or nothing of it" />
          {stored.length > 0 && (
            <Notice
              tone="ok"
              isAnnounced
              title={`${stored.length} ${stored.length === 1 ? 'file is' : 'files are'} stored.`}
              actions={
                <>
                  {storedTable && survey.can.change && (
                    <TextAction onClick={() => setDialog({ table: titleOf(storedTable) })}>
                      Use the table for {survey.name}
                    </TextAction>
                  )}
                  <Link href={`/${collaboration}/surveys/${survey.slug}`}>Open {survey.name}</Link>
                </>
              }
            >
              {stored.some((entry) => entry.kind === 'contrast-curves')
                ? 'The completeness maps start by themselves.'
                : 'The original bytes are kept beside what was read.'}
            </Notice>
          )}
          {ready.length > 0 && (
            <div className="mt-3">
              <Button variant="primary" onClick={() => void storeAll()}>
                {ready.length === 1 ? `Store ${ready[0].file.name}` : `Store ${ready.length} files`}
              </Button>
            </div>
          )}
        </section>
      )}
      <MapSettingsDialog
        key={dialog?.table}
        collaboration={collaboration}
        survey={survey}
        isOpen={dialog !== null}
        proposedTable={dialog?.table}
        onClose={() => setDialog(null)}
        onSaved={() => void mutate()}
      />
    </div>
  );
}

/** The name under which a cooling table was stored. */
function titleOf({ settings, file }: IncomingEntry): string {
  return settings.title ?? file.name.replace(/\.[^.]+$/, '');
}
