'use client';

import { Notice } from '@/components/ui/notice';
import { useDay } from '@/components/ui/time-zone';
import type { WithdrawnSurvey } from '@/lib/schemas/sharing';

/** Marks a run that rests on surveys which their owners take back. */
export function WithdrawnNotices({ surveys }: { surveys: readonly WithdrawnSurvey[] | undefined }) {
  const day = useDay();
  return surveys?.map(({ survey, owner, from, why }) => {
    const isOver = new Date(from) <= new Date();
    return (
      <Notice
        key={survey}
        tone="warn"
        title={`${survey} ${isOver ? 'was' : 'will be'} withdrawn by ${owner} on ${day(from)}.`}
      >
        Reason: {why}. This run stands with its attribution; nothing new may use the survey
        {isOver ? '' : ' from that day'}.
      </Notice>
    );
  });
}
