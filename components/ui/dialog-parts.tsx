'use client';

import * as Primitive from '@radix-ui/react-dialog';
import { type ReactNode, useRef } from 'react';
import { Icon } from './icon';

export interface DialogProps {
  isOpen: boolean;
  /** Asked for by Escape, by the ground behind, or by the close button. */
  onClose(): void;
  title: ReactNode;
  children: ReactNode;
  /** Two buttons at the foot. */
  actions?: ReactNode;
}

const ground = 'fixed inset-0 z-50 bg-plate/60';
const panel =
  'fixed z-50 border border-rule2 bg-surface text-ink overscroll-contain focus-visible:outline-none';

interface ModalProps {
  isOpen: boolean;
  onClose(): void;
  className: string;
  /** Takes the focus at first; otherwise the first control does. */
  initialFocus?: { current: HTMLElement | null };
  children: ReactNode;
}

/**
 * Holds the focus and gives it back. The page behind is held still by the style sheet: the library's
 * own overlay would write a style element, which the content policy refuses.
 */
export function Modal({ isOpen, onClose, className, initialFocus, children }: ModalProps) {
  const before = useRef<Element | null>(null);
  return (
    <Primitive.Root open={isOpen} onOpenChange={(isNowOpen) => !isNowOpen && onClose()}>
      <Primitive.Portal>
        <div className={ground} data-holds-page="" />
        <Primitive.Content
          aria-describedby={undefined}
          className={`${panel} ${className}`}
          onOpenAutoFocus={(event) => {
            before.current = document.activeElement;
            if (!initialFocus?.current) return;
            event.preventDefault();
            initialFocus.current.focus();
          }}
          onCloseAutoFocus={(event) => {
            event.preventDefault();
            if (before.current instanceof HTMLElement) before.current.focus();
          }}
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

/** The name of a modal that shows no heading of its own. */
export function HiddenModalTitle({ children }: { children: ReactNode }) {
  return <Primitive.Title className="sr-only">{children}</Primitive.Title>;
}

/** Consequence first, then what is asked, then two buttons. */
export function DialogPanel({ isOpen, onClose, title, children, actions }: DialogProps) {
  return (
    <Modal
      isOpen={isOpen}
      onClose={onClose}
      className="top-1/2 left-1/2 max-h-[calc(100dvh-32px)] w-[min(560px,calc(100vw-32px))] -translate-x-1/2 -translate-y-1/2 overflow-y-auto rounded-plate"
    >
      <div className="px-6 py-5">
        <div className="mb-3 flex items-start justify-between gap-4">
          <Primitive.Title className="text-section">{title}</Primitive.Title>
          <Primitive.Close className="-mt-2 -mr-2 flex size-9 shrink-0 items-center justify-center rounded text-ink3 max-md:size-11">
            <Icon name="close" />
            <span className="sr-only">Close</span>
          </Primitive.Close>
        </div>
        {children}
        {actions !== undefined && <div className="mt-4 flex flex-wrap gap-2">{actions}</div>}
      </div>
    </Modal>
  );
}
