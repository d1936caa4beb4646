'use client';

import * as Primitive from '@radix-ui/react-dropdown-menu';
import { type ReactNode, Suspense } from 'react';
import { Icon, type IconName } from './icon';
import { Link } from './link';
import { floatingLook, type MenuProps } from './menu-look';

/** The menu as the library makes it, open from the start: the light one before it was pressed. */
export function MenuRoot({ face, accessibleName, className, align = 'left', children }: MenuProps) {
  return (
    // Modal would lock the page's scrolling by a style element, which the content policy refuses.
    <Primitive.Root modal={false} defaultOpen>
      <Primitive.Trigger aria-label={accessibleName} className={className}>
        {face}
      </Primitive.Trigger>
      <Primitive.Portal>
        <Primitive.Content
          align={align === 'right' ? 'end' : 'start'}
          sideOffset={4}
          collisionPadding={8}
          loop
          className={`${floatingLook} max-h-[70dvh] min-w-48 max-w-[calc(100vw-16px)] overflow-y-auto py-1`}
        >
          <Suspense fallback={null}>{children}</Suspense>
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

const itemLook =
  'flex min-h-9 w-full cursor-pointer items-center gap-2 px-3.5 py-1 text-left text-ink text-note outline-none hover:no-underline data-[highlighted]:bg-act-soft data-[highlighted]:shadow-[inset_3px_0_0_var(--act)] max-lg:min-h-11';

export function MenuLink({
  href,
  isCurrent = false,
  children,
}: {
  href: string;
  isCurrent?: boolean;
  children: ReactNode;
}) {
  return (
    <Primitive.Item asChild>
      <Link
        href={href}
        aria-current={isCurrent ? 'true' : undefined}
        className={`${itemLook} ${isCurrent ? 'font-semibold' : ''}`}
      >
        {children}
      </Link>
    </Primitive.Item>
  );
}

/** An address that answers with a file. */
export function MenuFile({ href, children }: { href: string; children: ReactNode }) {
  return (
    <Primitive.Item asChild>
      <a href={href} download className={itemLook}>
        {children}
      </a>
    </Primitive.Item>
  );
}

export function MenuAction({ onSelect, children }: { onSelect(): void; children: ReactNode }) {
  return (
    <Primitive.Item className={itemLook} onSelect={onSelect}>
      {children}
    </Primitive.Item>
  );
}

interface MenuChoiceProps<V extends string> {
  label: string;
  value: V;
  options: { value: V; label: ReactNode; icon?: IconName }[];
  onChange(value: V): void;
}

/** One of a few, chosen without leaving the menu. */
export function MenuChoice<V extends string>({
  label,
  value,
  options,
  onChange,
}: MenuChoiceProps<V>) {
  return (
    <Primitive.RadioGroup
      aria-label={label}
      value={value}
      onValueChange={(next) => onChange(next as V)}
    >
      {options.map((option) => (
        <Primitive.RadioItem
          key={option.value}
          value={option.value}
          className={itemLook}
          onSelect={(event) => event.preventDefault()}
        >
          {option.icon && <Icon name={option.icon} size={15} className="text-ink3" />}
          <span className={option.value === value ? 'font-semibold' : ''}>{option.label}</span>
          <Primitive.ItemIndicator className="ml-auto">
            <Icon name="ok" size={15} />
          </Primitive.ItemIndicator>
        </Primitive.RadioItem>
      ))}
    </Primitive.RadioGroup>
  );
}

/** Words between the entries, such as whose menu it is. */
export function MenuNote({ children }: { children: ReactNode }) {
  return (
    <Primitive.Label className="block px-3.5 py-1.5 text-chart text-ink3">
      {children}
    </Primitive.Label>
  );
}

export function MenuRule() {
  return <Primitive.Separator className="my-1 border-rule border-t" />;
}
