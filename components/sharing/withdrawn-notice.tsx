import { Notice } from '@/components/ui/notice';
import type { WithdrawnSurvey } from '@/lib/schemas/sharing';
import { dayOf } from './share-words';

/** Marks a run that rests on surveys which their owners take back. */
export function WithdrawnNotices({ surveys }: { surveys: readonly WithdrawnSurvey[] | undefined }) {
  return surveys?.map(({ survey, owner, from, why }) => {
    const isOver = new Date(from) <= new Date();
    return (
      <Notice
        key={survey}
        tone="warn"
        title={`${survey} ${isOver ? 'was' : 'will be'} withdrawn by ${owner} on ${dayOf(from)}.`}
      >
        Reason: {why}. This run stands with its attribution; nothing new may use the survey
        {isOver ? '' : ' from that day'}.
      </Notice>
    );
  });
}
