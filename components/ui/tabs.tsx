'use client';

import * as Primitive from '@radix-ui/react-tabs';
import { type ReactNode, useState } from 'react';

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
  const current = selected ?? own;
  return (
    <Primitive.Root
      className="min-w-0"
      value={current}
      onValueChange={(id) => {
        setOwn(id);
        onSelect?.(id);
      }}
    >
      <Primitive.List
        aria-label={label}
        className="mb-3.5 flex flex-wrap gap-x-[26px] border-rule border-b"
      >
        {tabs.map((tab) => (
          <Primitive.Trigger
            key={tab.id}
            value={tab.id}
            className="min-h-9 whitespace-nowrap border-transparent border-b-[3px] pt-2 pb-1.5 text-ink2 data-[state=active]:border-ink data-[state=active]:font-semibold data-[state=active]:text-ink max-md:min-h-11"
          >
            {tab.label}
            {tab.count !== undefined && (
              <span className="ml-1.5 font-normal text-ink3">{tab.count}</span>
            )}
          </Primitive.Trigger>
        ))}
      </Primitive.List>
      {tabs.map((tab) => (
        <Primitive.Content key={tab.id} value={tab.id} className="min-w-0">
          {tab.content}
        </Primitive.Content>
      ))}
    </Primitive.Root>
  );
}
