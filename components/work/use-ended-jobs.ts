'use client';

import { usePathname } from 'next/navigation';
import { useEffect, useRef } from 'react';
import { announce } from '@/components/ui/toast-store';
import type { JobView } from '@/lib/schemas/jobs';
import { endedSentence, isOpenJob, jobHref } from './job-words';

/** Says when a computation that was seen open has ended; not on the page that shows it anyway. */
export function useEndedJobs(collaboration: string, jobs: JobView[] | undefined): void {
  const seenOpen = useRef(new Set<string>());
  const pathname = usePathname();
  useEffect(() => {
    for (const job of jobs ?? []) {
      if (isOpenJob(job)) {
        seenOpen.current.add(job.id);
        continue;
      }
      if (!seenOpen.current.delete(job.id)) continue;
      const ended = endedSentence(job);
      const href = jobHref(collaboration, job);
      if (ended === undefined || pathname === href) continue;
      announce({ ...ended, body: job.fault ?? undefined, link: { href, label: 'Open' } });
    }
  }, [collaboration, jobs, pathname]);
}
