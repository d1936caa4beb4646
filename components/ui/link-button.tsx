import type { ReactNode } from 'react';
import { type ButtonSize, type ButtonVariant, buttonLook } from './button-look';
import { Icon, type IconName } from './icon';
import { Link } from './link';

interface LinkButtonProps {
  href: string;
  variant?: ButtonVariant;
  size?: ButtonSize;
  icon?: IconName;
  isWide?: boolean;
  /** The address answers with a file: followed by the browser itself, not by the router. */
  isDownload?: boolean;
  children: ReactNode;
}

export function LinkButton({
  href,
  variant = 'normal',
  size = 'normal',
  icon,
  isWide = false,
  isDownload = false,
  children,
}: LinkButtonProps) {
  const look = buttonLook(variant, size, false, isWide);
  const content = (
    <>
      {icon !== undefined && <Icon name={icon} />}
      {children}
    </>
  );
  return isDownload ? (
    <a href={href} download className={look}>
      {content}
    </a>
  ) : (
    <Link href={href} className={look}>
      {content}
    </Link>
  );
}
