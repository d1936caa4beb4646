'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';

/** The address of the page, which names what is compared. */
export function CopyLink() {
  const [said, setSaid] = useState('Copy link');
  return (
    <Button
      icon="link"
      onClick={async () => {
        try {
          await navigator.clipboard.writeText(window.location.href);
          setSaid('Link copied');
        } catch {
          setSaid('Not copied: the browser refused');
        }
      }}
    >
      <span aria-live="polite">{said}</span>
    </Button>
  );
}
