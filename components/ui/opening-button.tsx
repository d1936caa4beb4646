'use client';

import { type ReactNode, Suspense, useState } from 'react';

interface OpeningButtonProps {
  face: ReactNode;
  accessibleName?: string;
  className: string;
  opens: 'menu' | 'dialog';
  /** Begins to load what opens: called as soon as the pointer or the focus comes near. */
  load(): Promise<unknown>;
  /** The button together with what it opens, open; takes the place of this one once it is loaded. */
  whenPressed: ReactNode;
}

/** A button whose menu or panel is loaded only for those who want it. */
export function OpeningButton({
  face,
  accessibleName,
  className,
  opens,
  load,
  whenPressed,
}: OpeningButtonProps) {
  const [isWanted, setWanted] = useState(false);
  const plain = (
    <button
      type="button"
      aria-haspopup={opens}
      aria-expanded={false}
      aria-label={accessibleName}
      className={className}
      onPointerEnter={load}
      onFocus={load}
      onClick={() => setWanted(true)}
      onKeyDown={(event) => {
        if (opens !== 'menu' || event.key !== 'ArrowDown') return;
        event.preventDefault();
        setWanted(true);
      }}
    >
      {face}
    </button>
  );
  return isWanted ? <Suspense fallback={plain}>{whenPressed}</Suspense> : plain;
}
