'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/components/hooks/use-action';
import { enterDemonstration } from '@/components/hooks/use-demonstration';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';

/** The way into the collaboration of invented data. */
export function EnterDemonstration() {
  const router = useRouter();
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const enter = () =>
    perform(async () => router.push(`/${(await enterDemonstration()).collaboration}`));
  return (
    <div className="mt-4">
      <Button icon="eye" onClick={enter} isBusy={isBusy}>
        Look around the demonstration
      </Button>
      <p className="mt-1.5 max-w-[60ch] text-ink3 text-note">
        Four invented surveys with their analyses; you come in as a student.
      </p>
      {problem !== undefined && (
        <Notice tone="bad" title="It could not be opened." isAnnounced>
          {problem}
        </Notice>
      )}
    </div>
  );
}
