'use client';

import { type KeyboardEvent, useId, useRef, useState } from 'react';
import { inputEdge, inputLook } from '@/components/ui/field-frame';
import { type MentionQuery, mentionAt, type Nameable, putMention, suggestPeople } from './mentions';

interface MentionFieldProps {
  label: string;
  value: string;
  people: readonly Nameable[];
  rows?: number;
  isFocused?: boolean;
  onChange(text: string): void;
  onPick(person: Nameable): void;
  onFocus(): void;
  /** Ctrl or Command with Enter. */
  onSend(): void;
}

/** Lines of text in which an @ offers people: arrows choose, Enter or Tab takes, Escape closes. */
export function MentionField(props: MentionFieldProps) {
  const { label, value, people, rows = 3, isFocused, onChange, onPick, onFocus, onSend } = props;
  const area = useRef<HTMLTextAreaElement>(null);
  const [query, setQuery] = useState<MentionQuery | null>(null);
  const [active, setActive] = useState(0);
  const id = useId();
  const offered = query === null ? [] : suggestPeople(people, query.typed);
  const isOpen = offered.length > 0;
  const optionId = (index: number) => `${id}-option-${index}`;

  const look = () => {
    const { selectionStart, selectionEnd, value: text } = area.current as HTMLTextAreaElement;
    setQuery(selectionStart === selectionEnd ? mentionAt(text, selectionStart) : null);
    setActive(0);
  };
  const take = (person: Nameable) => {
    if (query === null) return;
    const { text, cursor } = putMention(value, query, person.name);
    onChange(text);
    onPick(person);
    setQuery(null);
    requestAnimationFrame(() => {
      area.current?.focus();
      area.current?.setSelectionRange(cursor, cursor);
    });
  };
  const press = (event: KeyboardEvent<HTMLTextAreaElement>) => {
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      onSend();
      return;
    }
    if (!isOpen) return;
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step !== undefined) setActive((active + step + offered.length) % offered.length);
    else if (event.key === 'Enter' || event.key === 'Tab') take(offered[active]);
    else if (event.key === 'Escape') setQuery(null);
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  return (
    <div className="relative">
      <label htmlFor={id} className="mb-[5px] block text-ink2 text-note">
        {label}
      </label>
      <textarea
        ref={area}
        id={id}
        dir="auto"
        rows={rows}
        maxLength={4000}
        value={value}
        // biome-ignore lint/a11y/noAutofocus: it opens because the person asked to answer or to change
        autoFocus={isFocused}
        className={`block py-2 ${inputLook} ${inputEdge(undefined)}`}
        aria-autocomplete="list"
        aria-haspopup="listbox"
        aria-controls={isOpen ? `${id}-people` : undefined}
        aria-activedescendant={isOpen ? optionId(active) : undefined}
        onChange={(event) => {
          onChange(event.target.value);
          look();
        }}
        onClick={look}
        onFocus={onFocus}
        onBlur={() => setQuery(null)}
        onKeyDown={press}
      />
      <p className="sr-only" role="status">
        {isOpen ? `${offered.length} ${offered.length === 1 ? 'person' : 'people'} to name` : ''}
      </p>
      {isOpen && (
        <div
          id={`${id}-people`}
          role="listbox"
          aria-label="People to name"
          className="absolute top-full left-0 z-30 mt-1 w-[min(320px,100%)] rounded border border-rule2 bg-surface py-1"
        >
          {offered.map((person, index) => (
            // biome-ignore lint/a11y/useKeyWithClickEvents: the keys of the list are those of the text field, which keeps the focus
            <div
              key={person.id}
              id={optionId(index)}
              role="option"
              tabIndex={-1}
              aria-selected={index === active}
              className={`cursor-pointer px-3.5 py-1.5 text-note max-md:py-2.5 ${index === active ? 'bg-act-soft font-semibold' : ''}`}
              // The field keeps the focus while the mouse presses.
              onMouseDown={(event) => event.preventDefault()}
              onClick={() => take(person)}
            >
              <bdi>{person.name}</bdi>
            </div>
          ))}
        </div>
      )}
    </div>
  );
}
