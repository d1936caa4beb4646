import type { ReactNode } from 'react';
import { Icon, type IconName } from './icon';

export type StateKind =
  | 'draft'
  | 'unsaved'
  | 'waiting'
  | 'running'
  | 'frozen'
  | 'released'
  | 'ok'
  | 'warn'
  | 'bad'
  | 'stopped';

const states: Record<StateKind, { icon: IconName; colour: string; isStrong: boolean }> = {
  draft: { icon: 'draft', colour: 'text-ink3', isStrong: true },
  unsaved: { icon: 'draft', colour: 'text-warn', isStrong: true },
  waiting: { icon: 'draft', colour: 'text-ink3', isStrong: false },
  running: { icon: 'running', colour: 'text-act', isStrong: true },
  frozen: { icon: 'lock', colour: 'text-act', isStrong: true },
  released: { icon: 'diamond', colour: 'text-act', isStrong: true },
  ok: { icon: 'ok', colour: 'text-ok', isStrong: false },
  warn: { icon: 'warn', colour: 'text-warn', isStrong: false },
  bad: { icon: 'bad', colour: 'text-bad', isStrong: false },
  stopped: { icon: 'bad', colour: 'text-ink3', isStrong: true },
};

/** A state is an icon and a word, never colour alone. */
export function StateMark({ kind, children }: { kind: StateKind; children: ReactNode }) {
  const { icon, colour, isStrong } = states[kind];
  return (
    <span
      className={`inline-flex items-center gap-1.5 align-middle text-note ${colour} ${isStrong ? 'font-semibold' : ''}`}
    >
      <Icon name={icon} size={14} />
      <span>{children}</span>
    </span>
  );
}
