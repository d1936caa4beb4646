'use client';

import { usePathname, useSearchParams } from 'next/navigation';
import { useEffect, useState } from 'react';
import { Icon } from '@/components/ui/icon';

/** Says, while it lasts, that the server does not answer or that this session has ended. */
export function LostBanner({ lost }: { lost: 'session' | 'connection' | undefined }) {
  const pathname = usePathname();
  const search = useSearchParams().toString();
  const [isOffline, setOffline] = useState(false);
  useEffect(() => {
    const look = () => setOffline(!navigator.onLine);
    look();
    window.addEventListener('online', look);
    window.addEventListener('offline', look);
    return () => {
      window.removeEventListener('online', look);
      window.removeEventListener('offline', look);
    };
  }, []);
  const what = isOffline ? 'connection' : lost;
  const here = search === '' ? pathname : `${pathname}?${search}`;
  return (
    <div role="status" className="print:hidden">
      {what !== undefined && (
        <p className="mx-auto flex max-w-[1440px] flex-wrap items-center gap-x-3 gap-y-1 bg-warn-soft px-[22px] py-2 text-ink2 text-note lg:px-10">
          <Icon name="warn" className="text-warn" />
          {what === 'session' ? (
            <>
              <b className="text-ink">You are signed out here.</b> What is typed on this page stays
              only while the page stays.
              <a href={`/sign-in?next=${encodeURIComponent(here)}`} className="font-semibold">
                Sign in again
              </a>
            </>
          ) : (
            <>
              <b className="text-ink">No answer from the server.</b> Shown values may be old;
              nothing is saved until it answers. It is asked again every few seconds.
            </>
          )}
        </p>
      )}
    </div>
  );
}
