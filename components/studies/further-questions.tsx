'use client';

import { memo } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useRunStudies } from '@/components/hooks/use-studies';
import { FoldSection } from '@/components/ui/fold-section';
import { Link } from '@/components/ui/link';
import type { StudySummary } from '@/lib/schemas/studies';
import { AnswerState } from './earlier-answers';
import { kindOrder, kindWords, questionAddress } from './kind-words';

interface FurtherQuestionsProps {
  collaboration: string;
  analysisKey: string;
  runId: string;
  number?: number;
  /** Set while the setting on the screen is another: the answers are still those of this run. */
  ofRun?: number;
}

/** What may be asked of a run next, with the newest answer of each. */
export const FurtherQuestions = memo(function FurtherQuestions(props: FurtherQuestionsProps) {
  const { collaboration, analysisKey, runId, number, ofRun } = props;
  const { data: studies, error } = useRunStudies(collaboration, runId);
  const newest = newestByKind(studies ?? []);
  const answered = kindOrder.filter((kind) => newest.get(kind)?.job.status === 'done').length;
  return (
    <FoldSection
      id="further-questions"
      number={number}
      title="Further questions"
      context={`asked of ${ofRun === undefined ? 'this run' : `run ${ofRun}`}, computed by the workers, kept with it`}
      answer={`${answered} of ${kindOrder.length} answered`}
    >
      {error !== undefined && (
        <p className="mb-2 text-bad text-note" role="status">
          Earlier answers could not be fetched: {sentenceOf(error)}
        </p>
      )}
      <ul className="border-rule border-t">
        {kindOrder.map((kind) => {
          const study = newest.get(kind);
          const { title, question } = kindWords[kind];
          return (
            <li
              key={kind}
              className="grid items-baseline gap-x-6 gap-y-0.5 border-rule border-b py-2.5 text-note md:grid-cols-[minmax(0,5fr)_minmax(0,6fr)_48px]"
            >
              <div className="min-w-0">
                <h3 className="text-body">{title}</h3>
                <p className="text-ink2">{question}</p>
              </div>
              <div className={`min-w-0 ${ofRun === undefined ? 'text-ink2' : 'text-ink3'}`}>
                {study ? (
                  <>
                    <AnswerState study={study} />
                    {ofRun !== undefined && study.job.status === 'done' && `, run ${ofRun}`}
                  </>
                ) : (
                  <span className="text-ink3">{studies ? 'not asked yet' : ''}</span>
                )}
              </div>
              <Link
                className="inline-flex items-center font-semibold max-md:min-h-11 md:justify-end"
                href={questionAddress(
                  collaboration,
                  analysisKey,
                  kind,
                  kind === 'forecast' ? study?.id : undefined,
                )}
              >
                {study ? 'Open' : 'Ask'}
                <span className="sr-only">: {title}</span>
              </Link>
            </li>
          );
        })}
      </ul>
    </FoldSection>
  );
});

/** The newest question of each kind that is on its way or answered; a stopped one where none is. */
export function newestByKind(studies: StudySummary[]): Map<string, StudySummary> {
  const newest = new Map<string, StudySummary>();
  for (const study of [...studies].sort((a, b) => b.number - a.number)) {
    const { kind } = study.settings;
    const held = newest.get(kind);
    const isAnswer = study.job.status === 'done';
    if (!held || (isAnswer && !isOpen(held) && held.job.status !== 'done')) newest.set(kind, study);
  }
  return newest;
}

const isOpen = ({ job }: StudySummary) => job.status === 'waiting' || job.status === 'running';
