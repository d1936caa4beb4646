'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useEditing } from '@/components/hooks/use-editing';
import { createRelease, updateRelease } from '@/components/hooks/use-releases';
import { Button } from '@/components/ui/button';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import { TextAreaField } from '@/components/ui/text-area-field';
import { TextField } from '@/components/ui/text-field';
import { licences } from '@/lib/schemas/licences';
import { AuthorFields } from './author-fields';
import { draftOf, draftWords, placeWords, type ReleaseDraft } from './release-draft';
import { furtherGround } from './release-words';

/** A frozen run that may be part of a release. */
export interface FrozenChoice {
  id: string;
  name: string;
  sentence: string;
  prior: string;
  detections: string;
}

interface ReleaseFormProps {
  collaboration: string;
  choices: FrozenChoice[];
  /** Published releases that this one may take the place of. */
  published: { id: string; key: string; title: string }[];
  initial: ReleaseDraft;
  /** Id of the draft that is changed; a new one without it. */
  changed?: { id: string; key: string };
}

/** Title, people, words and runs of a release. */
export function ReleaseForm(props: ReleaseFormProps) {
  const { collaboration, choices, published, initial, changed } = props;
  const router = useRouter();
  const [draft, setDraft] = useState(initial);
  const editing = useEditing(initial);
  const [problem, setProblem] = useState<string>();
  const [isBusy, setBusy] = useState(false);
  const set = (change: Partial<ReleaseDraft>) => setDraft({ ...draft, ...change });
  const toggle = (id: string) =>
    set({
      runIds: draft.runIds.includes(id)
        ? draft.runIds.filter((one) => one !== id)
        : [...draft.runIds, id],
    });
  const nameOf = (id: string) =>
    choices.find((one) => one.id === id)?.name ?? published.find((one) => one.id === id)?.key ?? id;
  const save = async () => {
    setProblem(undefined);
    const authors = draft.authors
      .filter(({ name }) => name.trim() !== '')
      .map(({ name, affiliation, orcid }) => ({
        name,
        ...(affiliation?.trim() && { affiliation }),
        ...(orcid?.trim() && { orcid }),
      }));
    const { createReleaseSchema } = await import('@/lib/schemas/releases');
    const parsed = createReleaseSchema.safeParse({ ...draft, authors });
    if (!parsed.success) {
      const [issue] = parsed.error.issues;
      setProblem(`${placeWords(issue.path)}: expected ${issue.message}`);
      return;
    }
    setBusy(true);
    try {
      const isStored = await editing.attempt(draft, async (opened) => {
        const made = changed
          ? await updateRelease(collaboration, changed.id, draftOf, opened, parsed.data)
          : await createRelease(collaboration, parsed.data);
        router.push(`/${collaboration}/releases/${made.key}`);
        router.refresh();
      });
      if (!isStored) setBusy(false);
    } catch (reason) {
      setProblem(sentenceOf(reason));
      setBusy(false);
    }
  };
  return (
    <form
      className="grid gap-x-12 gap-y-8 pb-10 lg:grid-cols-2"
      onSubmit={(event) => {
        event.preventDefault();
        void save();
      }}
    >
      <section className="grid min-w-0 content-start gap-4">
        <SectionOpener number={1} title="What is released" />
        <TextField
          label="Title"
          value={draft.title}
          maxLength={200}
          required
          onChange={(event) => set({ title: event.target.value })}
        />
        <fieldset>
          <legend className="mb-1.5 font-semibold text-note">Frozen runs</legend>
          {choices.length === 0 ? (
            <p className="text-ink3 text-note">
              No run is frozen yet. Open an analysis and choose Freeze.
            </p>
          ) : (
            <div className="grid gap-2">
              {choices.map((choice) => (
                <CheckboxField
                  key={choice.id}
                  label={`${choice.name}: ${choice.sentence}`}
                  hint={furtherGround(choice)}
                  checked={draft.runIds.includes(choice.id)}
                  onChange={() => toggle(choice.id)}
                />
              ))}
            </div>
          )}
          <p className="mt-1.5 text-chart text-ink3">
            The first that you choose is the one on the plate of the page.
          </p>
        </fieldset>
        <TextAreaField
          label="Abstract"
          rows={5}
          value={draft.abstract}
          maxLength={5000}
          onChange={(event) => set({ abstract: event.target.value })}
        />
        <TextAreaField
          label="Note"
          hint="at the foot of the page"
          rows={2}
          value={draft.note}
          maxLength={5000}
          onChange={(event) => set({ note: event.target.value })}
        />
      </section>
      <section className="grid min-w-0 content-start gap-4">
        <SectionOpener number={2} title="By whom, and for whom" />
        <AuthorFields authors={draft.authors} onChange={(authors) => set({ authors })} />
        <SelectField
          label="Licence"
          value={draft.licence}
          options={Object.keys(licences).map((name) => ({ value: name, label: name }))}
          onChange={(event) => set({ licence: event.target.value })}
        />
        {published.length > 0 && (
          <SelectField
            label="Replaces"
            value={draft.replacesId ?? ''}
            options={[
              { value: '', label: 'no earlier release' },
              ...published.map(({ id, key, title }) => ({ value: id, label: `${key}, ${title}` })),
            ]}
            onChange={(event) => set({ replacesId: event.target.value || null })}
          />
        )}
        {changed && (
          <Notice tone="warn" title="Both signatures are asked for again.">
            They hold for what was read when they were given.
          </Notice>
        )}
        <ChangedNotice
          editing={editing}
          words={(one) => draftWords(one, nameOf)}
          onTake={setDraft}
          onKeep={() => void save()}
        />
        {problem !== undefined && (
          <Notice tone="bad" title="It was not saved." isAnnounced>
            {problem}
          </Notice>
        )}
        <div className="flex flex-wrap gap-2">
          <Button type="submit" variant="primary" isBusy={isBusy}>
            {changed ? `Save ${changed.key}` : 'Save the draft'}
          </Button>
          <LinkButton href={`/${collaboration}/releases${changed ? `/${changed.key}` : ''}`}>
            Leave it
          </LinkButton>
        </div>
      </section>
    </form>
  );
}
