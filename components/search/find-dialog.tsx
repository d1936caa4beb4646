'use client';

import { useRouter } from 'next/navigation';
import { type KeyboardEvent, useEffect, useId, useMemo, useRef, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useSearch } from '@/components/hooks/use-search';
import { HiddenModalTitle, Modal } from '@/components/ui/dialog-parts';
import { Icon } from '@/components/ui/icon';
import { TextAction } from '@/components/ui/text-action';
import { type BeginAction, type Entry, entriesHere, entryOfHit } from './entries';
import { keepRecent, readRecent } from './recent';
import { wordEntries } from './word-entries';

interface FindDialogProps {
  collaboration: string;
  actions: readonly BeginAction[];
  isOpen: boolean;
  onClose(): void;
}

/** Groups in the order of their first entry. */
function grouped(entries: Entry[]): { group: string; entries: Entry[] }[] {
  const groups = new Map<string, Entry[]>();
  for (const entry of entries) groups.set(entry.group, [...(groups.get(entry.group) ?? []), entry]);
  return [...groups].map(([group, members]) => ({ group, entries: members }));
}

/** One field for everything: arrows choose, Enter opens, Escape leaves. */
export function FindDialog({ collaboration, actions, isOpen, onClose }: FindDialogProps) {
  const [words, setWords] = useState('');
  const [chosen, setChosen] = useState(0);
  const field = useRef<HTMLInputElement>(null);
  const base = useId();
  const router = useRouter();
  const wanted = words.trim();
  const { data: hits, error, isSettled, mutate } = useSearch(collaboration, words);
  const sections = useMemo(() => {
    const here = entriesHere(collaboration, actions, wanted);
    if (wanted === '') {
      const recent = readRecent(collaboration).map((entry) => ({ ...entry, group: 'Opened last' }));
      const listed = new Set(recent.map(({ id }) => id));
      return grouped([...recent, ...here.filter(({ id }) => !listed.has(id))]);
    }
    const found = (hits ?? []).map((hit) => entryOfHit(collaboration, hit));
    return grouped([...found, ...here, ...wordEntries(wanted)]);
  }, [collaboration, actions, wanted, hits]);
  const entries = sections.flatMap((section) => section.entries);
  const current = entries[Math.min(chosen, entries.length - 1)];
  const optionId = (entry: Entry) => `${base}-${entry.id}`;

  useEffect(() => {
    if (current)
      document.getElementById(`${base}-${current.id}`)?.scrollIntoView({ block: 'nearest' });
  }, [base, current]);

  const open = (entry: Entry) => {
    keepRecent(collaboration, entry);
    onClose();
    router.push(entry.href);
  };
  const press = (event: KeyboardEvent) => {
    const last = entries.length - 1;
    const here = Math.min(chosen, last);
    const next = {
      ArrowDown: here === last ? 0 : here + 1,
      ArrowUp: here === 0 ? last : here - 1,
      PageDown: Math.min(last, here + 8),
      PageUp: Math.max(0, here - 8),
    }[event.key];
    if (next !== undefined) {
      event.preventDefault();
      setChosen(next);
    } else if (event.key === 'Enter' && current) {
      event.preventDefault();
      open(current);
    }
  };
  const isEmpty = entries.length === 0 && isSettled && error === undefined;
  return (
    <Modal
      isOpen={isOpen}
      onClose={onClose}
      initialFocus={field}
      className="top-0 left-1/2 flex max-h-dvh w-full -translate-x-1/2 flex-col rounded-plate md:top-[12dvh] md:max-h-[72dvh] md:w-[620px]"
    >
      <HiddenModalTitle>Find in the collaboration</HiddenModalTitle>
      <div className="flex items-center gap-2 border-rule border-b pl-4">
        <Icon name="find" className="text-ink3" />
        <input
          ref={field}
          type="text"
          role="combobox"
          aria-label="Find a page, a star, a survey, an analysis"
          aria-expanded={entries.length > 0}
          aria-controls={`${base}-list`}
          aria-autocomplete="list"
          aria-activedescendant={current && optionId(current)}
          autoComplete="off"
          spellCheck={false}
          maxLength={100}
          placeholder="Star, survey, A-31, Gaia number, page"
          className="h-13 min-w-0 flex-1 bg-transparent text-ink placeholder:text-ink3 focus-visible:outline-none"
          value={words}
          onChange={(event) => {
            setWords(event.target.value);
            setChosen(0);
          }}
          onKeyDown={press}
        />
        <button
          type="button"
          className="flex h-13 min-w-13 items-center justify-center text-ink3 text-note"
          onClick={onClose}
        >
          <span className="sr-only">Close the search</span>
          <Icon name="close" />
        </button>
      </div>
      <div
        id={`${base}-list`}
        role="listbox"
        aria-label="Found"
        className="min-h-0 flex-1 overflow-y-auto py-1"
      >
        {sections.map((section) => (
          // biome-ignore lint/a11y/useSemanticElements: a fieldset is no group of options
          <div key={section.group} role="group" aria-labelledby={`${base}-${section.group}`}>
            <div id={`${base}-${section.group}`} className="px-4 pt-2 pb-0.5 text-fine text-ink3">
              {section.group}
            </div>
            {section.entries.map((entry) => (
              // biome-ignore lint/a11y/useKeyWithClickEvents: the keys work on the field, which keeps the focus
              // biome-ignore lint/a11y/useFocusableInteractive: the field keeps the focus and names the chosen option
              <div
                key={entry.id}
                id={optionId(entry)}
                role="option"
                aria-selected={entry === current}
                className={`flex min-h-9 cursor-pointer items-baseline gap-2.5 px-4 py-1.5 max-md:min-h-11 max-md:items-center ${entry === current ? 'bg-act-soft' : ''}`}
                onClick={() => open(entry)}
                onPointerMove={() => setChosen(entries.indexOf(entry))}
              >
                <span className={`min-w-0 truncate ${entry === current ? 'font-semibold' : ''}`}>
                  {entry.title}
                </span>
                <span className="min-w-0 flex-1 truncate text-ink3 text-note">{entry.note}</span>
                {entry === current && (
                  <Icon name="forward" size={14} className="self-center text-act" />
                )}
              </div>
            ))}
          </div>
        ))}
      </div>
      <div aria-live="polite" className="border-rule border-t px-4 py-2 text-chart text-ink3">
        {error !== undefined && wanted !== '' ? (
          <span className="text-bad">
            {sentenceOf(error)} <TextAction onClick={() => void mutate()}>Ask again</TextAction>
          </span>
        ) : isEmpty ? (
          <>
            Nothing carries “{wanted}” in its name. A part of the name or of the Gaia number is
            enough.
          </>
        ) : wanted !== '' && !isSettled ? (
          'Looking'
        ) : (
          `${entries.length} ${entries.length === 1 ? 'place' : 'places'}; arrows choose, Enter opens`
        )}
      </div>
    </Modal>
  );
}
