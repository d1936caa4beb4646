'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { ApiProblem, sentenceOf } from '@/components/hooks/api-problem';
import { sendUpload, storeUpload } from '@/components/hooks/use-uploads';
import { FileCheck } from '@/components/surveys/file-check';
import { type FileKind, tableContainers } from '@/components/surveys/file-kinds';
import { FileNeeds } from '@/components/surveys/file-needs';
import type { IncomingEntry } from '@/components/surveys/incoming-entry';
import { FileDrop } from '@/components/ui/file-drop';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextField } from '@/components/ui/text-field';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { newestVersions } from './newest-versions';

const kind: FileKind = {
  kind: 'systems',
  label: 'systems',
  needs: ['system', 'mass [Mjup]', 'semi_major_axis [AU]'],
  takes: ['weight'],
  containers: tableContainers,
  sample: 'systems.csv',
  note: 'One row a companion, with the name or number of its system. A row without mass and semi-major axis stands for a system that has none: such systems count. Without a column weight every system weighs the same.',
};

interface SystemsUploadProps {
  collaboration: string;
  /** The population of which the file becomes a new version; else a new population. */
  version?: ListedPopulation;
}

/** A file of whole systems on its way to a population: read, checked, stored. */
export function SystemsUpload({ collaboration, version }: SystemsUploadProps) {
  const router = useRouter();
  const [name, setName] = useState('');
  const [entry, setEntry] = useState<IncomingEntry>();

  const read = async (next: IncomingEntry) => {
    setEntry({ ...next, state: 'reading', problem: null, failure: null });
    try {
      const upload = await sendUpload(collaboration, next.file, {
        kind: 'systems',
        settings: next.settings,
      });
      setEntry({ ...next, state: 'read', upload, problem: null, failure: null });
    } catch (reason) {
      const problem = reason instanceof ApiProblem ? reason : null;
      const failure = problem ? null : sentenceOf(reason);
      setEntry({ ...next, state: 'refused', upload: null, problem, failure });
    }
  };
  const take = (file: File) => {
    const title = name.trim() || (version?.name ?? file.name.replace(/\.[^.]+$/, ''));
    void read({
      key: `${Date.now()}`,
      file,
      kind: 'systems',
      settings: { title, ...(version && { versionOf: version.number }) },
      state: 'reading',
      upload: null,
      problem: null,
      failure: null,
    });
  };
  const store = async () => {
    if (!entry?.upload) return;
    setEntry({ ...entry, state: 'storing', failure: null });
    try {
      const upload = await storeUpload(collaboration, entry.upload.id);
      setEntry({ ...entry, state: 'stored', upload });
      const key = version?.key ?? (await keyOf(collaboration, entry.settings.title));
      router.push(`/${collaboration}/populations${key === undefined ? '' : `/${key}`}`);
      router.refresh();
    } catch (reason) {
      setEntry({ ...entry, state: 'read', failure: sentenceOf(reason) });
    }
  };
  return (
    <section className="min-w-0">
      <SectionOpener
        title={version ? 'A new version from a file' : 'Systems from a table'}
        context="every line is read and checked before anything is stored"
      />
      <div className="grid gap-x-14 gap-y-6 lg:grid-cols-2">
        <div className="flex min-w-0 flex-col gap-4">
          {!version && (
            <TextField
              label="Name"
              hint="Without one, the name of the file."
              value={name}
              maxLength={100}
              onChange={(event) => setName(event.target.value)}
            />
          )}
          <FileDrop
            label="Drop a file of systems here, or choose it"
            hint={`${kind.containers}; at most 20\u202f000 systems and companions`}
            isMultiple={false}
            onFiles={([file]) => file && take(file)}
          />
        </div>
        <FileNeeds kind={kind} />
      </div>
      {entry && (
        <div className="mt-6">
          <FileCheck
            entry={entry}
            onSettings={(settings) => void read({ ...entry, settings })}
            onStore={() => void store()}
            onDrop={() => setEntry(undefined)}
          />
          {entry.state === 'stored' && (
            <div className="mt-3">
              <Notice
                tone="ok"
                title="The systems are stored."
                isAnnounced
                actions={<Link href={`/${collaboration}/populations`}>Open populations</Link>}
              />
            </div>
          )}
        </div>
      )}
    </section>
  );
}

/** The population that a stored file became: the newest of that name that holds systems. */
async function keyOf(collaboration: string, name: string | undefined) {
  const versions = await newestVersions(collaboration);
  return versions
    .filter((version) => version.name === name && version.definition.form === 'systems')
    .sort((a, b) => b.createdAt.localeCompare(a.createdAt))[0]?.key;
}
