import type { Tone } from './notice';

export interface ToastMessage {
  id: number;
  tone: Tone;
  /** What happened, as a sentence. */
  title: string;
  body?: string;
  /** Where it can be seen. */
  link?: { href: string; label: string };
}

/** How many are shown at once: an older one leaves for a newer one. */
const MOST = 3;
const none: ToastMessage[] = [];

let messages = none;
let lastId = 0;
const listeners = new Set<() => void>();

function change(next: ToastMessage[]): void {
  messages = next;
  for (const listener of listeners) listener();
}

/** Says at the edge of the screen what happened elsewhere: copied, saved, a computation ended. */
export function announce(message: Omit<ToastMessage, 'id'>): void {
  lastId += 1;
  change([...messages, { ...message, id: lastId }].slice(-MOST));
}

export function dismissToast(id: number): void {
  change(messages.filter((message) => message.id !== id));
}

export const toastStore = {
  subscribe(listener: () => void) {
    listeners.add(listener);
    return () => void listeners.delete(listener);
  },
  read: () => messages,
  readOnServer: () => none,
};
