'use client';

import type { ButtonHTMLAttributes, ReactNode } from 'react';
import { Icon, type IconName } from './icon';

interface TextActionProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  icon?: IconName;
  children: ReactNode;
}

/** An action that looks like a link: for the tools of a section and the verbs of a notice. */
export function TextAction({ icon, children, className = '', ...rest }: TextActionProps) {
  return (
    <button
      type="button"
      {...rest}
      className={`inline-flex min-h-6 items-center gap-1.5 whitespace-nowrap text-act print:hidden hover:underline hover:underline-offset-3 max-md:min-h-11 ${className}`}
    >
      {icon !== undefined && <Icon name={icon} size={15} />}
      {children}
    </button>
  );
}
