import type { ReactNode } from 'react';
import { Icon, type IconName } from './icon';

export type Tone = 'ok' | 'warn' | 'bad' | 'neutral';

const tones: Record<Tone, { ground: string; mark: string; icon: IconName }> = {
  ok: { ground: 'bg-ok-soft', mark: 'text-ok', icon: 'ok' },
  warn: { ground: 'bg-warn-soft', mark: 'text-warn', icon: 'warn' },
  bad: { ground: 'bg-bad-soft', mark: 'text-bad', icon: 'bad' },
  neutral: { ground: 'bg-well', mark: 'text-ink3', icon: 'document' },
};

interface NoticeProps {
  tone: Tone;
  /** The fact, in bold. */
  title: ReactNode;
  /** What it means and what to do. */
  children?: ReactNode;
  /** At most two text actions. */
  actions?: ReactNode;
  icon?: IconName;
  /** Read out at once when it appears after something the person did. */
  isAnnounced?: boolean;
}

export function Notice({ tone, title, children, actions, icon, isAnnounced = false }: NoticeProps) {
  const look = tones[tone];
  return (
    <div
      className={`flex flex-wrap items-center gap-x-3 gap-y-1.5 rounded px-3.5 py-[9px] text-note ${look.ground}`}
      role={isAnnounced ? (tone === 'bad' ? 'alert' : 'status') : undefined}
    >
      <span className={`self-start pt-px ${look.mark}`}>
        <Icon name={icon ?? look.icon} size={18} />
      </span>
      <div className="min-w-0 flex-1 basis-60 text-ink2">
        <b className="text-ink">{title}</b> {children}
      </div>
      {actions !== undefined && (
        <div className="flex flex-wrap gap-x-4 font-semibold max-md:pl-[30px]">{actions}</div>
      )}
    </div>
  );
}
