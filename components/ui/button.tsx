'use client';

import { type ButtonHTMLAttributes, type ReactNode, type Ref, useId } from 'react';
import { type ButtonSize, type ButtonVariant, buttonLook } from './button-look';
import { Icon, type IconName } from './icon';

export interface ButtonProps extends Omit<ButtonHTMLAttributes<HTMLButtonElement>, 'disabled'> {
  /** `primary` at most once a view. */
  variant?: ButtonVariant;
  size?: ButtonSize;
  icon?: IconName;
  isWide?: boolean;
  /** Why it cannot be pressed: shown on focus and hover, and the only way to switch it off. */
  disabledReason?: string;
  /** Work is under way; a second press does nothing. */
  isBusy?: boolean;
  children?: ReactNode;
  ref?: Ref<HTMLButtonElement>;
}

export function Button({
  variant = 'normal',
  size = 'normal',
  icon,
  isWide = false,
  disabledReason,
  isBusy = false,
  children,
  className = '',
  type = 'button',
  onClick,
  ...rest
}: ButtonProps) {
  const reasonId = useId();
  const isRefused = disabledReason !== undefined;
  const isStill = isRefused || isBusy;
  const button = (
    <button
      {...rest}
      type={type}
      className={`${buttonLook(variant, size, isRefused, isWide)} ${className}`}
      aria-disabled={isStill || undefined}
      aria-busy={isBusy || undefined}
      aria-describedby={isRefused ? reasonId : rest['aria-describedby']}
      onClick={(event) => {
        if (isStill) {
          event.preventDefault();
          return;
        }
        onClick?.(event);
      }}
    >
      {isBusy ? <Icon name="running" /> : icon !== undefined && <Icon name={icon} />}
      {children}
    </button>
  );
  if (!isRefused) return button;
  return (
    <span className={`group relative ${isWide ? 'block' : 'inline-block'}`}>
      {button}
      <span
        id={reasonId}
        role="tooltip"
        className="pointer-events-none invisible absolute top-full right-0 z-30 mt-1.5 w-max max-w-64 rounded border border-rule2 bg-surface px-3 py-2 text-left text-ink2 text-note group-focus-within:visible group-hover:visible"
      >
        {disabledReason}
      </span>
    </span>
  );
}
