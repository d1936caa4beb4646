'use client';

import { type KeyboardEvent, type ReactNode, useId, useState } from 'react';

export interface Tab {
  id: string;
  label: ReactNode;
  count?: number;
  content: ReactNode;
}

interface TabsProps {
  /** What the tabs divide, for readers. */
  label: string;
  tabs: Tab[];
  /** Given with `onSelect` where the choice lives in the address; else kept here. */
  selected?: string;
  onSelect?(id: string): void;
}

export function Tabs({ label, tabs, selected, onSelect }: TabsProps) {
  const [own, setOwn] = useState(tabs[0]?.id);
  const base = useId();
  const current = selected ?? own;
  const select = (id: string) => {
    setOwn(id);
    onSelect?.(id);
  };
  const move = (event: KeyboardEvent<HTMLDivElement>) => {
    const here = tabs.findIndex((tab) => tab.id === current);
    const there = {
      ArrowRight: here + 1,
      ArrowLeft: here - 1,
      Home: 0,
      End: tabs.length - 1,
    }[event.key];
    if (there === undefined) return;
    event.preventDefault();
    const next = tabs[(there + tabs.length) % tabs.length];
    select(next.id);
    event.currentTarget.querySelector<HTMLElement>(`[data-tab="${CSS.escape(next.id)}"]`)?.focus();
  };
  const chosen = tabs.find((tab) => tab.id === current);
  return (
    <div>
      <div
        role="tablist"
        aria-label={label}
        tabIndex={-1}
        className="mb-3.5 flex gap-[26px] overflow-x-auto border-rule border-b"
        onKeyDown={move}
      >
        {tabs.map((tab) => {
          const isChosen = tab.id === current;
          return (
            <button
              key={tab.id}
              type="button"
              role="tab"
              id={`${base}-tab-${tab.id}`}
              data-tab={tab.id}
              aria-selected={isChosen}
              aria-controls={`${base}-panel`}
              tabIndex={isChosen ? 0 : -1}
              className={`min-h-9 whitespace-nowrap border-b-[3px] pt-2 pb-1.5 focus-visible:-outline-offset-2 max-md:min-h-11 ${isChosen ? 'border-ink font-semibold text-ink' : 'border-transparent text-ink2'}`}
              onClick={() => select(tab.id)}
            >
              {tab.label}
              {tab.count !== undefined && (
                <span className="ml-1.5 font-normal text-ink3">{tab.count}</span>
              )}
            </button>
          );
        })}
      </div>
      {chosen !== undefined && (
        <div
          role="tabpanel"
          id={`${base}-panel`}
          aria-labelledby={`${base}-tab-${chosen.id}`}
          className="min-w-0"
        >
          {chosen.content}
        </div>
      )}
    </div>
  );
}
