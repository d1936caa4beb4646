import type { ReactNode } from 'react';
import { Icon, type IconName } from './icon';

type ProgressState = 'done' | 'running' | 'waiting' | 'failed';

const marks: Record<ProgressState, { icon: IconName; colour: string; word: string }> = {
  done: { icon: 'ok', colour: 'text-ok', word: 'done' },
  running: { icon: 'running', colour: 'text-data', word: 'running' },
  waiting: { icon: 'draft', colour: 'text-ink3', word: 'waiting' },
  failed: { icon: 'bad', colour: 'text-bad', word: 'failed' },
};

interface ProgressLineProps {
  label: ReactNode;
  /** The same in plain words, for the bar's name. */
  accessibleName: string;
  done: number;
  total: number;
  state: ProgressState;
  /** "about 40 s left", or how long it took. */
  time?: ReactNode;
  /** A stop button. */
  action?: ReactNode;
}

/** One stage: icon, name, bar, count, time. Several of them under each other make a run. */
export function ProgressLine({
  label,
  accessibleName,
  done,
  total,
  state,
  time,
  action,
}: ProgressLineProps) {
  const mark = marks[state];
  const share = total > 0 ? Math.min(1, done / total) : 0;
  return (
    <div className="grid grid-cols-[22px_minmax(0,1fr)_auto] items-center gap-x-2.5 gap-y-1 border-rule border-b py-2 text-note md:grid-cols-[22px_minmax(120px,190px)_1fr_96px_minmax(48px,auto)_auto]">
      <span className={mark.colour}>
        <Icon name={mark.icon} />
        <span className="sr-only">{mark.word}</span>
      </span>
      <b>{label}</b>
      <div
        role="progressbar"
        aria-label={accessibleName}
        aria-valuemin={0}
        aria-valuemax={total}
        aria-valuenow={done}
        className="h-[7px] bg-well max-md:order-last max-md:col-span-3"
      >
        <div className="h-full bg-data" style={{ width: `${100 * share}%` }} />
      </div>
      <span className="whitespace-nowrap text-right text-ink3">
        {state === 'waiting' ? 'waiting' : `${done} of ${total}`}
      </span>
      {time !== undefined && (
        <span className="whitespace-nowrap text-right text-ink3 max-md:order-last max-md:col-span-3 max-md:text-left">
          {time}
        </span>
      )}
      {action !== undefined && <div className="max-md:order-last max-md:col-span-3">{action}</div>}
    </div>
  );
}
