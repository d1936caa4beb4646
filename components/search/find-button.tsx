'use client';

import dynamic from 'next/dynamic';
import { useCallback, useEffect, useState } from 'react';
import { Icon } from '@/components/ui/icon';
import type { BeginAction } from './entries';

const FindDialog = dynamic(() => import('./find-dialog').then((module) => module.FindDialog));

const isTyping = (target: EventTarget | null) =>
  target instanceof HTMLElement &&
  (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));

/** Opens the search, as "/" and Ctrl or Command with K do anywhere on the page. */
export function FindButton({
  collaboration,
  actions,
}: {
  collaboration: string;
  actions: readonly BeginAction[];
}) {
  const [isOpen, setOpen] = useState(false);
  // Each opening begins with an empty field; before the first nothing of it is loaded.
  const [opened, setOpened] = useState(0);
  const show = useCallback(() => {
    setOpened((count) => count + 1);
    setOpen(true);
  }, []);
  useEffect(() => {
    const press = (event: KeyboardEvent) => {
      const isCommand = (event.ctrlKey || event.metaKey) && event.key.toLowerCase() === 'k';
      const isSlash = event.key === '/' && !event.ctrlKey && !event.metaKey && !event.altKey;
      if (!isCommand && !(isSlash && !isTyping(event.target))) return;
      if (!isCommand && document.querySelector('[role=dialog]')) return;
      event.preventDefault();
      show();
    };
    document.addEventListener('keydown', press);
    return () => document.removeEventListener('keydown', press);
  }, [show]);
  return (
    <>
      <button
        type="button"
        aria-keyshortcuts="/ Control+K Meta+K"
        className="flex h-9 items-center gap-1.5 rounded text-ink2 hover:text-ink max-lg:size-11 max-lg:justify-center lg:px-1.5"
        onClick={show}
      >
        <Icon name="find" size={17} />
        <span className="max-xl:sr-only">Find</span>
        <span
          className="rounded border border-rule px-1.5 text-fine text-ink3 max-xl:hidden"
          aria-hidden="true"
        >
          /
        </span>
      </button>
      {opened > 0 && (
        <FindDialog
          key={opened}
          collaboration={collaboration}
          actions={actions}
          isOpen={isOpen}
          onClose={() => setOpen(false)}
        />
      )}
    </>
  );
}
