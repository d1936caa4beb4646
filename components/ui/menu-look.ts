import type { ReactNode } from 'react';

export type MenuLook = 'outlined' | 'quiet' | 'plain' | 'round';

/** How a button looks that opens something under itself. */
export const menuLooks: Record<MenuLook, string> = {
  outlined: 'h-9 gap-1.5 rounded border border-rule px-2.5 font-semibold max-lg:h-11',
  quiet: 'h-9 gap-1.5 px-1 font-semibold text-act max-lg:h-11',
  plain: 'h-9 gap-1 px-1.5 text-ink2 hover:text-ink max-lg:h-11',
  round:
    'size-8 justify-center rounded-full bg-act-soft font-bold text-act text-chart max-lg:size-11',
};

export const floatingLook =
  'z-[55] rounded border border-rule2 bg-surface text-ink focus-visible:outline-none';

/** What the button and its list are given, before and after the list was loaded. */
export interface MenuProps {
  face: ReactNode;
  accessibleName?: string;
  className: string;
  align?: 'left' | 'right';
  children: ReactNode;
}
