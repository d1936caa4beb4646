'use client';

import { useRouter } from 'next/navigation';
import { useEffect, useState } from 'react';
import { Button } from '../button';
import { Dialog } from '../dialog';

/** The link that a plain click would follow within the product, if it leads away from here. */
function leavingLink(event: MouseEvent): HTMLAnchorElement | null {
  if (event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey)
    return null;
  const link = event.target instanceof Element ? event.target.closest('a') : null;
  if (!link?.href || link.target === '_blank' || link.hasAttribute('download')) return null;
  const there = new URL(link.href);
  const isHere = there.origin !== location.origin || there.pathname === location.pathname;
  return isHere ? null : link;
}

/**
 * Asks before typed input is lost: links inside are held back for a dialogue; closing the tab and
 * leaving the product are asked about by the browser itself.
 */
export function LeaveGuard({ isUnsaved }: { isUnsaved: boolean }) {
  const [wanted, setWanted] = useState<string | null>(null);
  const router = useRouter();
  useEffect(() => {
    if (!isUnsaved) return;
    const hold = (event: MouseEvent) => {
      const link = leavingLink(event);
      if (link === null) return;
      event.preventDefault();
      event.stopPropagation();
      setWanted(link.getAttribute('href'));
    };
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    document.addEventListener('click', hold, true);
    window.addEventListener('beforeunload', ask);
    return () => {
      document.removeEventListener('click', hold, true);
      window.removeEventListener('beforeunload', ask);
    };
  }, [isUnsaved]);
  return (
    <Dialog
      isOpen={wanted !== null}
      onClose={() => setWanted(null)}
      title="Leave without saving?"
      actions={
        <>
          <Button variant="primary" onClick={() => setWanted(null)}>
            Stay
          </Button>
          <Button
            onClick={() => {
              const href = wanted;
              setWanted(null);
              if (href !== null) router.push(href);
            }}
          >
            Leave
          </Button>
        </>
      }
    >
      <p className="text-ink2">What is typed on this page is stored nowhere yet.</p>
    </Dialog>
  );
}
