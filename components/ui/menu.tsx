'use client';

import { lazy, type ReactNode } from 'react';
import { Icon } from './icon';
import { type MenuLook, menuLooks } from './menu-look';
import type * as Parts from './menu-parts';
import { OpeningButton } from './opening-button';

const load = () => import('./menu-parts');
const MenuRoot = lazy(async () => ({ default: (await load()).MenuRoot }));

export const MenuLink = lazy(async () => ({ default: (await load()).MenuLink }));
export const MenuFile = lazy(async () => ({ default: (await load()).MenuFile }));
export const MenuAction = lazy(async () => ({ default: (await load()).MenuAction }));
export const MenuNote = lazy(async () => ({ default: (await load()).MenuNote }));
export const MenuRule = lazy(async () => ({ default: (await load()).MenuRule }));
// The type of a lazy component forgets that the value is one of the options.
export const MenuChoice = lazy(async () => ({
  default: (await load()).MenuChoice,
})) as unknown as typeof Parts.MenuChoice;

interface MenuProps {
  label: ReactNode;
  /** Says what the button is for where the label alone does not. */
  accessibleName?: string;
  children: ReactNode;
  align?: 'left' | 'right';
  look?: MenuLook;
}

/** A button that opens a short list of links and actions; arrows and letters move, Escape closes. */
export function Menu({ label, accessibleName, children, align, look = 'outlined' }: MenuProps) {
  const className = `flex max-w-full items-center whitespace-nowrap md:max-w-[15rem] ${menuLooks[look]} ${look === 'round' ? 'shrink-0' : 'min-w-0'}`;
  const face = (
    <>
      <span className="truncate">{label}</span>
      {look !== 'round' && <Icon name="down" size={14} />}
    </>
  );
  const button = { face, accessibleName, className };
  return (
    <OpeningButton
      {...button}
      opens="menu"
      load={load}
      whenPressed={
        <MenuRoot {...button} align={align}>
          {children}
        </MenuRoot>
      }
    />
  );
}
