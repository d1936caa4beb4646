'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { retryJob } from '@/components/hooks/use-runs';
import { useWork } from '@/components/hooks/use-work';
import { FactsStrip } from '@/components/ui/facts-strip';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { useMoment } from '@/components/ui/time-zone';
import { jobTitle } from '@/components/work/job-words';
import type { JobView } from '@/lib/schemas/jobs';
import type { WorkView } from '@/lib/schemas/work';
import { DurationTable } from './duration-table';
import { FailedTable } from './failed-table';
import { QueueTable } from './queue-table';
import { RunningTable } from './running-table';

/** What the collaboration has in the queue, what failed, and who works: for owners. */
export function WorkScreen({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: WorkView;
}) {
  const { data: work = initial, error, mutate } = useWork(collaboration, initial);
  const [told, setTold] = useState<{ tone: 'ok' | 'bad'; title: string } | null>(null);
  const moment = useMoment();
  const { queue, running, failed, durations, workers, maxAttempts } = work;
  const total = (key: 'waiting' | 'running') => queue.reduce((sum, row) => sum + row[key], 0);
  const retry = async (job: JobView) => {
    setTold(null);
    try {
      await retryJob(collaboration, job.id);
      await mutate();
      setTold({ tone: 'ok', title: `${jobTitle(job)} waits for a worker.` });
    } catch (reason) {
      setTold({ tone: 'bad', title: sentenceOf(reason) });
    }
  };
  const threads = `${workers.threads} thread${workers.threads === 1 ? '' : 's'}`;
  const engine = workers.engineVersions.join(', ');
  const facts = [
    { name: 'running', value: total('running') },
    { name: 'waiting', value: total('waiting') },
    { name: 'failed', value: failed.length },
    {
      name: workers.processes === 1 ? 'worker' : 'workers',
      value: workers.processes,
      note: workers.processes > 0 ? threads : undefined,
    },
    ...(engine === '' ? [] : [{ name: 'engine', value: engine }]),
  ];
  return (
    <>
      <PageTitle
        title="Queue and workers"
        crumbs={[{ href: `/${collaboration}/settings`, label: 'Settings' }]}
        context="The work of this collaboration; the workers are those of the whole server"
      />
      <div className="grid gap-3 empty:hidden [&:not(:empty)]:mb-5">
        {error !== undefined && (
          <Notice tone="warn" title="This page is not current.">
            {sentenceOf(error)}
          </Notice>
        )}
        {workers.processes === 0 && (
          <Notice tone="warn" title="No worker is running.">
            Pages work; what is to be computed waits until one starts.
          </Notice>
        )}
        {workers.engineVersions.length > 1 && (
          <Notice tone="warn" title={`Workers of several engines are running: ${engine}.`}>
            Maps of one engine are not reused by another; update every machine.
          </Notice>
        )}
        {told !== null && <Notice {...told} isAnnounced />}
      </div>
      <FactsStrip facts={facts} />
      {workers.lastSeenAt !== null && (
        <p className="mb-8 text-ink3 text-note">
          Last sign of a worker {moment(workers.lastSeenAt)}
        </p>
      )}
      <div className="grid gap-x-14 gap-y-10 lg:grid-cols-2">
        <section className="min-w-0">
          <SectionOpener title="Running" context="with the lease that its worker renews" />
          <RunningTable {...{ collaboration, running, maxAttempts }} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Queue" context="running and waiting, by kind" />
          <QueueTable queue={queue} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Failed" context="the newest first" />
          <FailedTable {...{ collaboration, failed }} onRetry={(job) => void retry(job)} />
        </section>
        <section className="min-w-0">
          <SectionOpener title="Durations" context="last 24 hours, from start to end" />
          <DurationTable durations={durations} />
        </section>
      </div>
    </>
  );
}
