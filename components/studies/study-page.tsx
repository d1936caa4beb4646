'use client';

import { useState } from 'react';
import { FigureFrame } from '@/components/figures/figure-frame';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { askStudy, useStudiesOfKind, useStudy } from '@/components/hooks/use-studies';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { StudySummary, StudyView } from '@/lib/schemas/studies';
import type { SettingsOf, StudyKind } from '@/lib/schemas/study-settings';
import { AnswerExports } from './answer-exports';
import { answerFigures } from './answer-files';
import { AnswerConditions, AnswerProvenance } from './answer-foot';
import { answerOf, askedRun, useAnsweredRun } from './answered-run';
import { EarlierAnswers } from './earlier-answers';
import { kindWords } from './kind-words';
import { kinds, settingsInWords } from './kinds';
import { QuestionEnded, QuestionProgress } from './question-progress';

export interface StudyPageProps<Kind extends StudyKind> {
  kind: Kind;
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run; null while there is none. */
  run: PackedRun | null;
  runPopulation: ListedPopulation | null;
  /** The answer that the address names. */
  answerId?: string;
  /** What was asked of this kind, and the answer that is shown first. */
  first: { studies: StudySummary[]; study?: StudyView };
}

const cannotAsk =
  'Only whoever made this analysis, a statistician, an author or an owner can ask further questions of it. Copy it, run the copy and ask there.';

/** One kind of further question: its settings, its job, its answers and what they rest on. */
export function StudyPage<Kind extends StudyKind>(props: StudyPageProps<Kind>) {
  const { kind, collaboration, analysis, runPopulation, first } = props;
  const run = useUnpackedRun(props.run);
  const entry = kinds[kind];
  const [chosenId, setChosenId] = useState(props.answerId);
  const { perform, isBusy, problem, faults } = useAction();
  const { data: all, error, mutate } = useStudiesOfKind(collaboration, kind, first.studies);
  const studies = all?.filter((study) => study.run.analysisKey === analysis.key);
  const open = studies?.filter(({ job }) => job.status === 'waiting' || job.status === 'running');
  const shownId = chosenId ?? studies?.find(({ job }) => job.status === 'done')?.id;
  const { data: study, error: studyError } = useStudy(collaboration, shownId, first.study);
  const answered = useAnsweredRun({ collaboration, analysis, run, runPopulation, study });
  useAddressQuery(chosenId === undefined ? {} : { answer: chosenId });

  const newest = studies?.[0];
  const hasEnded = newest?.job.status === 'failed' || newest?.job.status === 'cancelled';
  const canAsk = analysis.can.run;
  const asked = run && askedRun({ collaboration, analysis, run, definition: runPopulation });
  const answer = study && answered && answerOf(kind, study, answered);
  const refresh = () => {
    void mutate();
  };

  const ask = async (settings: SettingsOf<Kind>) => {
    if (!run) return;
    await perform(async () => {
      const begun = await askStudy(collaboration, run.id, settings);
      setChosenId(begun.job.status === 'done' ? begun.id : undefined);
      await mutate();
    });
  };
  const nameOf = ({ settings }: StudySummary) =>
    `${kindWords[settings.kind].title.toLowerCase()}, ${settingsInWords(settings)}`;

  return (
    <>
      <PageTitle
        title={kindWords[kind].title}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { href: `/${collaboration}/analyses/${analysis.key}`, label: analysis.key },
          { label: 'further question' },
        ]}
        context={kindWords[kind].question}
        actions={entry && answer && <AnswerExports entry={entry} answer={answer} />}
      />
      {!asked || !entry ? (
        <EmptyState
          title="No run to ask yet"
          actions={
            <LinkButton variant="primary" href={`/${collaboration}/analyses/${analysis.key}`}>
              Open {analysis.key}
            </LinkButton>
          }
        >
          A further question is asked of a finished run. Run {analysis.key} first; its stars, maps
          and detections are what this question rests on.
        </EmptyState>
      ) : (
        <div className="grid min-w-0 gap-8 pb-10">
          <div className="grid min-w-0 gap-3">
            <entry.Form
              key={study?.id ?? 'first'}
              asked={asked}
              start={answer?.settings}
              isBusy={isBusy}
              disabledReason={canAsk ? undefined : cannotAsk}
              faults={faults}
              onAsk={ask}
            />
            {problem !== undefined && faults.length === 0 && (
              <Notice tone="bad" title="It was not asked." isAnnounced>
                {problem}
              </Notice>
            )}
            {open?.map((one) => (
              <QuestionProgress
                key={one.id}
                collaboration={collaboration}
                study={one}
                name={nameOf(one)}
                canStop={canAsk}
                onChanged={refresh}
              />
            ))}
            {newest && hasEnded && (
              <QuestionEnded
                collaboration={collaboration}
                study={newest}
                name={nameOf(newest)}
                canStop={canAsk}
                mend="Change the settings above and ask again, or retry as it is."
                onChanged={refresh}
                onDeleted={refresh}
              />
            )}
            {(error ?? studyError) !== undefined && (
              <Notice tone="bad" title="Answers could not be fetched.">
                {sentenceOf(error ?? studyError)}
              </Notice>
            )}
          </div>
          {answer ? (
            <>
              <section className="min-w-0">
                <SectionOpener
                  title={`Answer ${study.number}`}
                  help={kindWords[kind].help}
                  context={settingsInWords(study.settings)}
                />
                {study.headline !== null && (
                  <p className="statement mb-5 max-w-5xl">{study.headline}</p>
                )}
                {answered.run.id !== asked.run.id && (
                  <div className="mb-4">
                    <Notice
                      tone="warn"
                      title={`Answered from run ${answered.run.number}; run ${asked.run.number} is newer.`}
                    >
                      Ask again to have the answer for run {asked.run.number}.
                    </Notice>
                  </div>
                )}
                <FigureFrame collaboration={collaboration} {...answerFigures(entry, answer)}>
                  <entry.Answer {...answer} />
                </FigureFrame>
              </section>
              <AnswerConditions asked={answered} settings={settingsInWords(study.settings)} />
              <AnswerProvenance
                collaboration={collaboration}
                study={study}
                onDeleted={() => {
                  setChosenId(undefined);
                  refresh();
                }}
              />
            </>
          ) : (
            <AnswerToCome isKnown={studies !== undefined} isExpected={shownId !== undefined} />
          )}
          {studies !== undefined && studies.length > 0 && (
            <section className="min-w-0">
              <SectionOpener title="Asked before" context={`${studies.length} of this kind`} />
              <EarlierAnswers
                studies={studies}
                shownId={answer ? study.id : undefined}
                settingsInWords={(one) => settingsInWords(one.settings)}
                onShow={setChosenId}
              />
            </section>
          )}
        </div>
      )}
    </>
  );
}

/** What stands in the place of an answer until there is one. */
function AnswerToCome({ isKnown, isExpected }: { isKnown: boolean; isExpected: boolean }) {
  if (isKnown && !isExpected) {
    return (
      <p className="text-ink2">
        Not answered yet. Ask above: a worker computes the answer, and it is kept with the run.
      </p>
    );
  }
  return (
    <p className="max-w-none rounded-plate bg-well px-5 py-16 text-ink3 text-note" role="status">
      Fetching the answer
    </p>
  );
}
