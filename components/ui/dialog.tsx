'use client';

import { type ReactNode, useEffect, useId, useRef } from 'react';
import { Icon } from './icon';

interface DialogProps {
  isOpen: boolean;
  /** Asked for by Escape, by the ground behind, or by the close button. */
  onClose(): void;
  title: ReactNode;
  children: ReactNode;
  /** Two buttons at the foot. */
  actions?: ReactNode;
}

/** The platform's own modal dialogue: it holds the focus and gives it back. */
export function Dialog({ isOpen, onClose, title, children, actions }: DialogProps) {
  const dialog = useRef<HTMLDialogElement>(null);
  const titleId = useId();

  useEffect(() => {
    const element = dialog.current;
    if (!element) return;
    if (isOpen && !element.open) element.showModal();
    if (!isOpen && element.open) element.close();
  }, [isOpen]);

  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: Escape is the key for it, and the platform sends it as `cancel`
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      className="m-auto w-[min(560px,calc(100vw-32px))] rounded-plate border border-rule2 bg-surface text-ink backdrop:bg-plate/60"
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClick={(event) => {
        if (event.target === dialog.current) onClose();
      }}
    >
      {isOpen && (
        <div className="px-6 py-5">
          <div className="mb-3 flex items-start justify-between gap-4">
            <h2 id={titleId} className="text-section">
              {title}
            </h2>
            <button
              type="button"
              className="-mt-2 -mr-2 flex size-9 items-center justify-center rounded text-ink3 max-md:size-11"
              onClick={onClose}
            >
              <Icon name="close" />
              <span className="sr-only">Close</span>
            </button>
          </div>
          {children}
          {actions !== undefined && <div className="mt-4 flex flex-wrap gap-2">{actions}</div>}
        </div>
      )}
    </dialog>
  );
}
