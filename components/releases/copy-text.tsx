'use client';

import { useState } from 'react';
import { TextAction } from '@/components/ui/text-action';

/** Copies a text; what happened stands in place of the word for a while. */
export function CopyText({ text, label }: { text: string; label: string }) {
  const [said, setSaid] = useState<string>();
  return (
    <span aria-live="polite" className="print:hidden">
      <TextAction
        onClick={() => {
          navigator.clipboard.writeText(text).then(
            () => setSaid('Copied'),
            () => setSaid('Not copied: the browser refused'),
          );
        }}
      >
        {said ?? label}
      </TextAction>
    </span>
  );
}
