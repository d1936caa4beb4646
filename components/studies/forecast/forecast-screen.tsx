'use client';

import { useRouter } from 'next/navigation';
import { FigureFrame } from '@/components/figures/figure-frame';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useStudy } from '@/components/hooks/use-studies';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { StateMark } from '@/components/ui/state-mark';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { StudyView } from '@/lib/schemas/studies';
import { AnswerExports } from '../answer-exports';
import { answerFigures } from '../answer-files';
import { AnswerConditions, AnswerProvenance } from '../answer-foot';
import { answerOf, useAnsweredRun } from '../answered-run';
import { kinds } from '../kinds';
import { QuestionEnded, QuestionProgress } from '../question-progress';
import { plannedInWords } from './forecast-words';

interface ForecastScreenProps {
  collaboration: string;
  study: StudyView;
  analysis: AnalysisView;
  /** Newest finished run of the analysis; the forecast may rest on an earlier one. */
  run: PackedRun | null;
  runPopulation: ListedPopulation | null;
  canAsk: boolean;
}

/** One forecast: its job while it is computed, then its answer and what that rests on. */
export function ForecastScreen(props: ForecastScreenProps) {
  const { collaboration, analysis, runPopulation, canAsk } = props;
  const run = useUnpackedRun(props.run);
  const router = useRouter();
  const { data: study = props.study, error, mutate } = useStudy(collaboration, props.study.id);
  const answered = useAnsweredRun({ collaboration, analysis, run, runPopulation, study });
  const answer = answered && answerOf('forecast', study, answered);
  const entry = kinds.forecast;
  const { settings, job } = study;
  if (settings.kind !== 'forecast' || !entry) return null;
  const leave = () => {
    router.push(`/${collaboration}/forecasts`);
    router.refresh();
  };
  const shared = {
    collaboration,
    study,
    name: settings.name,
    canStop: canAsk,
    onChanged: () => {
      void mutate();
    },
  };
  return (
    <>
      <PageTitle
        title={settings.name}
        crumbs={[
          { href: `/${collaboration}/forecasts`, label: 'Forecasts' },
          { label: `from ${study.run.analysisKey}, run ${study.run.number}` },
        ]}
        state={<StateMark kind="draft">Forecast</StateMark>}
        context={plannedInWords(settings)}
        actions={
          <>
            {canAsk && (
              <LinkButton href={`/${collaboration}/forecasts/new?from=${study.id}`}>
                Change and ask again
              </LinkButton>
            )}
            {answer && <AnswerExports entry={entry} answer={answer} />}
          </>
        }
      />
      <div className="grid min-w-0 gap-8 pb-10">
        {error !== undefined && (
          <Notice tone="bad" title="The forecast could not be fetched anew.">
            {sentenceOf(error)}
          </Notice>
        )}
        {(job.status === 'waiting' || job.status === 'running') && <QuestionProgress {...shared} />}
        {(job.status === 'failed' || job.status === 'cancelled') && (
          <QuestionEnded
            {...shared}
            mend="Change it and ask again, or retry as it is."
            onDeleted={leave}
          />
        )}
        {answer && (
          <>
            <section className="min-w-0">
              {study.headline !== null && (
                <p className="statement mb-5 max-w-5xl">
                  <i>Forecast.</i> {study.headline}
                </p>
              )}
              <FigureFrame collaboration={collaboration} {...answerFigures(entry, answer)}>
                <entry.Answer {...answer} />
              </FigureFrame>
            </section>
            <AnswerConditions
              asked={answer.asked}
              settings={`forecast, ${entry.settingsInWords(settings)}`}
            />
            <AnswerProvenance collaboration={collaboration} study={study} onDeleted={leave} />
          </>
        )}
        {!answer && job.status === 'done' && (
          <p className="rounded-plate bg-well px-5 py-16 text-ink3 text-note" role="status">
            Fetching the run that this forecast starts from
          </p>
        )}
      </div>
    </>
  );
}
