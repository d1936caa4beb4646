'use client';

import * as Primitive from '@radix-ui/react-toast';
import { useSyncExternalStore } from 'react';
import { Icon, type IconName } from './icon';
import { Link } from './link';
import type { Tone } from './notice';
import { dismissToast, toastStore } from './toast-store';

const marks: Record<Tone, { icon: IconName; colour: string }> = {
  ok: { icon: 'ok', colour: 'text-ok' },
  warn: { icon: 'warn', colour: 'text-warn' },
  bad: { icon: 'bad', colour: 'text-bad' },
  neutral: { icon: 'document', colour: 'text-ink3' },
};

/** Long enough to read twice; the time stands still under the pointer and the focus. */
const SHOWN_MS = 8000;

/** The messages as the library shows and reads them out. */
export function ToasterPanel() {
  const messages = useSyncExternalStore(
    toastStore.subscribe,
    toastStore.read,
    toastStore.readOnServer,
  );
  return (
    <Primitive.Provider duration={SHOWN_MS} label="News" swipeDirection="right">
      {messages.map(({ id, tone, title, body, link }) => (
        <Primitive.Root
          key={id}
          type={tone === 'bad' ? 'foreground' : 'background'}
          onOpenChange={(isOpen) => !isOpen && dismissToast(id)}
          className="flex items-start gap-2.5 rounded border border-rule2 bg-surface py-2.5 pr-2 pl-3.5 text-note"
        >
          <span className={`mt-px ${marks[tone].colour}`}>
            <Icon name={marks[tone].icon} size={18} />
          </span>
          <div className="min-w-0 flex-1">
            <Primitive.Title className="font-semibold text-ink">{title}</Primitive.Title>
            {body !== undefined && (
              <Primitive.Description className="text-ink2">{body}</Primitive.Description>
            )}
            {link !== undefined && (
              <Primitive.Action altText={`${link.label}: ${title}`} asChild>
                <Link href={link.href} className="mt-0.5 inline-block font-semibold">
                  {link.label}
                </Link>
              </Primitive.Action>
            )}
          </div>
          <Primitive.Close className="flex size-7 shrink-0 items-center justify-center rounded text-ink3 max-md:size-11">
            <Icon name="close" size={14} />
            <span className="sr-only">Close this message</span>
          </Primitive.Close>
        </Primitive.Root>
      ))}
      <Primitive.Viewport className="fixed right-4 bottom-4 z-[60] max-md:bottom-20 flex w-[min(380px,calc(100vw-32px))] list-none flex-col gap-2 print:hidden" />
    </Primitive.Provider>
  );
}
