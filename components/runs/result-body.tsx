'use client';

import dynamic from 'next/dynamic';
import {
  type ComponentProps,
  memo,
  type ReactNode,
  useCallback,
  useEffect,
  useMemo,
  useRef,
  useState,
} from 'react';
import type { PosteriorView } from '@/components/charts/posterior-chart';
import { FigureFrame } from '@/components/figures/figure-frame';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useCalm } from '@/components/hooks/use-calm';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { ShownStatementCopy } from '@/components/statement/statement-copy';
import { FootBar } from '@/components/ui/foot-bar';
import { Notice } from '@/components/ui/notice';
import { Plate } from '@/components/ui/plate';
import { TextAction } from '@/components/ui/text-action';
import { countsAnything, describeLevel } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import type { LiveSample } from './live-sample';
import { type LiveSetting, quantityOf } from './live-setting';
import { posteriorData } from './posterior-data';
import { ProvenanceSection } from './provenance';
import { conditionRows, ResultStatement } from './result-statement';
import { runFigures } from './run-figures';
import { type ShownResult, showResult } from './shown-result';
import { isAsRun } from './under';
import { useAnnounced } from './use-announced';
import { useLiveResult } from './use-live-result';
import { useLiveTask } from './use-live-task';
import { useMapFigures } from './use-map-figures';
import type { RunSource } from './use-run-source';

/** Drawn by the server with the number that they belong to, and made live after it. */
const PosteriorChart = dynamic(
  async () => (await import('@/components/charts/posterior-chart')).PosteriorChart,
);
const ChecksStrip = dynamic(async () => (await import('./checks-strip')).ChecksStrip);
const ResultConsole = dynamic(async () => (await import('./result-console')).ResultConsole);
const CalibrationCheck = dynamic(
  async () => (await import('@/components/studies/calibration/calibration-check')).CalibrationCheck,
);
const AgesCoolingOffer = dynamic(
  async () => (await import('./ages-cooling-offer')).AgesCoolingOffer,
);
const ResultSections = dynamic(async () => (await import('./result-sections')).ResultSections);
const FurtherQuestions = dynamic(
  async () => (await import('@/components/studies/further-questions')).FurtherQuestions,
);

interface ResultBodyProps {
  collaboration: string;
  run: DrawnRun;
  inputs: DrawnInputs;
  result: DrawnResult;
  /** The setting that the run was made with. */
  inRun: LiveSetting;
  setting: LiveSetting;
  isUnsaved: boolean;
  /** The same object while a hand moves a control. */
  source: RunSource;
  /** Whether this person may ask the run further questions. */
  canAsk: boolean;
  /** Repeated at the foot of a narrow screen. */
  footActions: ReactNode;
  onSetting(setting: LiveSetting): void;
}

/** How often the tracks of the other controls, and the words of the figures' files, follow a hand. */
const PACE = { paceMs: 400 };

/** A finished run under its controls: what is shown follows the setting, or says that it does not. */
export function ResultBody(props: ResultBodyProps) {
  const { collaboration, run, inputs, result, inRun, setting, isUnsaved, onSetting } = props;
  const { sample, error, agesCooling: others } = props.source;
  const isLeft = !isAsRun(setting);
  const { wantsAll, wantAll } = others;
  useEffect(() => {
    if (isLeft && !wantsAll) wantAll();
  }, [isLeft, wantsAll, wantAll]);
  const isWaiting = isLeft && (others.isFetching || !wantsAll);
  const outcome = useLiveResult(isWaiting ? undefined : sample, setting);
  const models = others.answer?.result.models;
  const shown = useMemo(
    () => showResult(inputs, result, inRun, setting, outcome, models),
    [inputs, result, inRun, setting, outcome, models],
  );
  const { map, depth, profiles } = useMapFigures(result, inputs, sample, setting);
  const onDefinition = useLatestDefinition(setting, onSetting);
  const followed = useMemo(
    () => ({ shown, depth, definition: setting.definition }),
    [shown, depth, setting],
  );
  const calibration = useMemo(
    () => (
      <CalibrationCheck
        collaboration={collaboration}
        analysisKey={run.analysis.key}
        runId={run.id}
        ofRun={shown.isLive ? run.number : undefined}
      />
    ),
    [collaboration, run, shown.isLive],
  );
  const settled = useCalm(shown, PACE);
  const figures = useMemo(
    () => runFigures(run, inputs, result, settled),
    [run, inputs, result, settled],
  );
  const insideCount = inputs.companions.length - shown.outside.length;

  return (
    <FigureFrame collaboration={collaboration} {...figures}>
      <ResultPlate {...{ run, inputs, result, shown, onDefinition }} grid={map} />
      {outcome?.fault !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title="This setting has no answer." isAnnounced>
            {outcome.fault} The plate shows run {run.number} meanwhile.
          </Notice>
        </div>
      )}
      {error !== undefined && (
        <div className="mt-3">
          <Notice
            tone="bad"
            title="The controls have no maps to follow."
            actions={
              <TextAction icon="undo" onClick={props.source.fetchAgain}>
                Fetch again
              </TextAction>
            }
          >
            {sentenceOf(error)} The numbers are those of run {run.number}.
          </Notice>
        </div>
      )}
      <div className="mt-2.5">
        <LiveConsole
          sample={sample}
          setting={setting}
          saved={inRun}
          quantity={quantityOf(setting.likelihood)}
          grid={map}
          profiles={profiles}
          candidates={inputs.undecided.length}
          countedLabel={insideCount === 1 ? '1 vetted' : `${insideCount} vetted`}
          inputs={others.answer ?? undefined}
          offer={
            others.answer === null ? (
              <AgesCoolingOffer
                collaboration={collaboration}
                run={run}
                open={others.open}
                canAsk={props.canAsk}
                onAsked={others.refresh}
              />
            ) : undefined
          }
          onSetting={onSetting}
        />
        {others.error !== undefined && (
          <p className="mt-2 text-note text-warn" role="status">
            Maps for other ages and cooling models could not be fetched: {sentenceOf(others.error)}
          </p>
        )}
        {sample && isWaiting && others.error === undefined && (
          <p className="mt-2 text-ink3 text-note" role="status">
            Fetching the maps for these ages and this cooling model; until then the numbers are
            those of run {run.number}.
          </p>
        )}
        {!sample && error === undefined && (
          <p className="mt-2 text-ink3 text-note" role="status">
            Fetching the maps of {result.stars} stars; until then the numbers are those of run{' '}
            {run.number}.
          </p>
        )}
      </div>
      <ChecksStrip
        inputs={inputs}
        map={map}
        definition={settled.setting.definition}
        shareOutsideMaps={shown.shareOutsideMaps}
        shareFlaggedCooling={result.shareFlaggedCooling}
        candidates={shown.candidates}
        ofRun={shown.isLive ? run.number : undefined}
        calibration={calibration}
      />
      <ResultSections
        inputs={inputs}
        result={result}
        run={run}
        sample={sample}
        map={map}
        followed={followed}
        onDefinition={onDefinition}
      />
      <div className="pb-10 md:mt-8">
        <ProvenanceSection {...{ collaboration, run, result }} isLive={isUnsaved || shown.isLive} />
        <div className="md:mt-8">
          <FurtherQuestions
            number={7}
            collaboration={collaboration}
            analysisKey={run.analysis.key}
            runId={run.id}
            ofRun={shown.isLive ? run.number : undefined}
          />
        </div>
      </div>
      <FootBar>
        <div className="min-w-0 flex-1 leading-[1.2]">
          <b className="block text-[22px] text-bound">
            {shown.answer.isConstrained
              ? formatLimit(shown.answer.limit, shown.quantity)
              : 'no limit'}
          </b>
          <span className="text-chart text-ink3">
            {describeLevel(shown.setting.credibleLevel)},{' '}
            <MassRange definition={shown.setting.definition} />,{' '}
            <AxisRange definition={shown.setting.definition} />
          </span>
        </div>
        {props.footActions}
      </FootBar>
    </FigureFrame>
  );
}

/** The controls with the limits along their tracks, which a thread beside the page computes. */
function LiveConsole({
  sample,
  ...console
}: Omit<ComponentProps<typeof ResultConsole>, 'consequences'> & { sample?: LiveSample }) {
  const { setting, saved } = console;
  const asked = useCalm(setting, PACE);
  const { answer, fault } = useLiveTask(sample, 'consequences', asked, saved);
  return (
    <>
      <ResultConsole {...console} consequences={answer} />
      {fault !== undefined && (
        <p className="mt-2 text-note text-warn" role="status">
          The limits along the tracks could not be computed: {fault}. Number and curve follow the
          controls all the same.
        </p>
      )}
    </>
  );
}

/** The statement beside its posterior. */
const ResultPlate = memo(function ResultPlate({
  run,
  inputs,
  result,
  shown,
  grid,
  onDefinition,
}: {
  run: DrawnRun;
  inputs: DrawnInputs;
  result: DrawnResult;
  shown: ShownResult;
  grid: { massMjup: Float64Array; semiMajorAxisAu: Float64Array };
  onDefinition(definition: PowerLawDefinition): void;
}) {
  const [view, setView] = useState<PosteriorView>('density');
  const { quantity, saved, isLive, isOfRun, ...numbers } = shown;
  const spoken = (limit: number, of: typeof quantity) =>
    formatLimit(limit, of).replace('<', 'below ');
  const announced = useAnnounced(
    isLive && !isOfRun
      ? `Limit ${spoken(shown.answer.limit, quantity)}, saved ${spoken(saved.answer.limit, saved.quantity)}`
      : '',
  );
  const ends = (nodes: Float64Array): [number, number] => [nodes[0], nodes[nodes.length - 1]];
  return (
    <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[440px_1fr]">
      <div className={isOfRun ? 'opacity-60' : undefined}>
        <ResultStatement
          setting={shown.setting}
          quantity={quantity}
          answer={shown.answer}
          mark={isOfRun ? `run ${run.number}` : isLive ? 'live' : undefined}
          bounds={{ mass: ends(grid.massMjup), axis: ends(grid.semiMajorAxisAu) }}
          conditions={conditionRows({
            ...numbers,
            quantity,
            stars: result.stars,
            counted: shown.counted.map(({ name }) => name),
          })}
          announced={announced}
          copy={
            <ShownStatementCopy
              make={async () => {
                const { documentOfShown } = await import(
                  '@/components/statement/document-of-shown'
                );
                return documentOfShown({ run, inputs, result, shown });
              }}
            />
          }
          onDefinition={onDefinition}
        />
      </div>
      <PosteriorChart
        {...posteriorData({
          setting: shown.setting,
          quantity,
          answer: shown.answer,
          zero: shown.counted.length > 0 ? shown.zero : undefined,
          hasInterval: countsAnything(shown.counted, shown.candidates),
          saved: isLive && !isOfRun && saved.quantity === quantity ? saved : undefined,
        })}
        view={view}
        onViewChange={setView}
      />
    </Plate>
  );
});

/** A handler that stays the same, so that what is memoised is not drawn anew for its sake. */
function useLatestDefinition(setting: LiveSetting, onSetting: (setting: LiveSetting) => void) {
  const latest = useRef({ setting, onSetting });
  latest.current = { setting, onSetting };
  return useCallback((definition: PowerLawDefinition) => {
    const { setting: present, onSetting: change } = latest.current;
    change({ ...present, definition });
  }, []);
}
