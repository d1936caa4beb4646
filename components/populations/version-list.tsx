'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { ChangedMeanwhile } from '@/components/hooks/change';
import { sharePopulation } from '@/components/hooks/use-populations';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import { useDay } from '@/components/ui/time-zone';
import type { ListedPopulation } from '@/lib/schemas/populations';

/** Every version with who made it and what rests on it; none of them ever changes. */
export function VersionList({
  collaboration,
  versions,
  shown,
}: {
  collaboration: string;
  versions: ListedPopulation[];
  shown: ListedPopulation;
}) {
  const day = useDay();
  const router = useRouter();
  const [problem, setProblem] = useState<string>();
  const share = async () => {
    try {
      await sharePopulation(collaboration, shown.key, shown.version, true);
      setProblem(undefined);
      router.refresh();
    } catch (reason) {
      setProblem(sentenceOf(reason));
      if (reason instanceof ChangedMeanwhile) router.refresh();
    }
  };
  return (
    <section className="min-w-0">
      <SectionOpener
        title="All versions"
        tools={
          shown.can.share && (
            <TextAction onClick={share}>Share version {shown.version} with all</TextAction>
          )
        }
      />
      {problem !== undefined && (
        <div className="mb-3">
          <Notice tone="bad" title="It was not shared." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
      <ol className="text-note">
        {versions.map((version) => (
          <li key={version.id} className="border-rule border-b py-2">
            <span className="flex flex-wrap items-baseline justify-between gap-x-4">
              {version.id === shown.id ? (
                <b>Version {version.version}, shown here</b>
              ) : (
                <Link
                  className="font-semibold max-md:py-2"
                  href={`/${collaboration}/populations/${version.key}?version=${version.version}`}
                >
                  Version {version.version}
                </Link>
              )}
              <span className="text-ink3">
                {[version.createdBy, day(version.createdAt)].filter(Boolean).join(', ')}
              </span>
            </span>
            <span className="block text-ink2">
              {version.note === '' ? 'Without a note' : version.note}
              {version.usedBy.length > 0 && (
                <span className="block text-ink3">used by {version.usedBy.join(', ')}</span>
              )}
            </span>
          </li>
        ))}
      </ol>
    </section>
  );
}
