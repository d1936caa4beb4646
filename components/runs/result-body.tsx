'use client';

import { type ReactNode, useMemo, useState } from 'react';
import { PosteriorChart, type PosteriorView } from '@/components/charts/posterior-chart';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { FoldSection } from '@/components/ui/fold-section';
import { FootBar } from '@/components/ui/foot-bar';
import { Notice } from '@/components/ui/notice';
import { Plate } from '@/components/ui/plate';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel, describePrior } from '@/lib/inference';
import { isInside } from '@/lib/population';
import { formatLimit } from '@/lib/quantities/display';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunInputs, RunResult, RunView } from '@/lib/schemas/runs';
import { ChecksStrip } from './checks-strip';
import { DetectionsSection } from './detections-section';
import { LevelTable, percentBelow } from './level-table';
import { savedAnswer } from './live-answer';
import { sampleOf } from './live-sample';
import { isSameSetting, type LiveSetting, quantityOf } from './live-setting';
import { posteriorData } from './posterior-data';
import { Provenance, ProvenanceDetails, provenanceSteps } from './provenance';
import { ResultConsole } from './result-console';
import { conditionRows, ResultStatement } from './result-statement';
import { SensitivitySection } from './sensitivity-section';
import { StarsSection } from './stars-section';
import { useAnnounced } from './use-announced';
import { useLiveResult } from './use-live-result';
import { useLiveTask } from './use-live-task';
import { useMapFigures } from './use-map-figures';

interface ResultBodyProps {
  collaboration: string;
  analysis: AnalysisView;
  run: RunView;
  inputs: RunInputs;
  result: RunResult;
  /** The setting that the run was made with. */
  inRun: LiveSetting;
  setting: LiveSetting;
  isUnsaved: boolean;
  /** Repeated at the foot of a narrow screen. */
  footActions: ReactNode;
  onSetting(setting: LiveSetting): void;
}

/** A finished run under its controls: what is shown follows the setting, or says that it does not. */
export function ResultBody(props: ResultBodyProps) {
  const { collaboration, run, inputs, result, inRun, setting, isUnsaved, onSetting } = props;
  const { data: maps, error, mutate } = useRunMaps(collaboration, run);
  const sample = useMemo(() => maps && sampleOf(inputs, maps), [inputs, maps]);
  const outcome = useLiveResult(sample, setting);
  const { answer: consequences, fault: trackFault } = useLiveTask(
    sample,
    'consequences',
    setting,
    inRun,
  );
  const saved = useMemo(
    () => ({ answer: savedAnswer(result.answer), zero: savedAnswer(result.zero) }),
    [result],
  );
  const [view, setView] = useState<PosteriorView>('density');

  const isLive = !isSameSetting(setting, inRun);
  const live = outcome?.live;
  // Until the maps are there a moved setting has no number: the run's own stands, and says so.
  const shownSetting = live ? setting : inRun;
  const quantity = quantityOf(shownSetting.likelihood);
  const answer = live?.answer ?? saved.answer;
  const zero = live?.zero ?? saved.zero;
  const levels = live?.levels ?? result.levels;
  const { definition } = shownSetting;
  const savedQuantity = quantityOf(inRun.likelihood);

  const { grid, map, depth, profiles } = useMapFigures(result, inputs, sample, setting.definition);

  const counted = live
    ? live.full.counted.map(({ name }) => name)
    : result.counted.map(({ name }) => name);
  const setAside = (reason: string) =>
    live?.full.setAside.flatMap((one) => (one.reason === reason ? [one.detection.name] : [])) ?? [];
  const outside = live
    ? inputs.companions
        .filter((one) => !isInside(definition, one.massMjup, one.semiMajorAxisAu))
        .map(({ name }) => name)
    : result.outside.map(({ name }) => name);
  const shareOutsideMaps = outcome?.view?.shareOutsideMap ?? result.shareOutsideMaps;
  const exposure = outcome?.view?.exposure ?? result.exposure;
  const insideCount = inputs.companions.length - outside.length;
  const limitText = formatLimit(answer.limit, quantity);
  const announced = useAnnounced(
    isLive && live
      ? `Limit ${limitText.replace('<', 'below ')}, saved ${formatLimit(saved.answer.limit, savedQuantity).replace('<', 'below ')}`
      : '',
  );
  const foot = (
    <>
      <MassRange definition={definition} />, <AxisRange definition={definition} />;{' '}
      {describePrior(shownSetting.prior, quantity)}.
    </>
  );
  const steps = provenanceSteps(collaboration, run).length;
  const stepLevel = (level: number) => levels.find((row) => Math.abs(row.level - level) < 1e-9);

  return (
    <>
      <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[440px_1fr]">
        <div className={isLive && !live ? 'opacity-60' : undefined}>
          <ResultStatement
            setting={shownSetting}
            quantity={quantity}
            answer={answer}
            mark={isLive ? (live ? 'live' : `run ${run.number}`) : undefined}
            bounds={{
              mass: [grid.massMjup[0], grid.massMjup[grid.massMjup.length - 1]],
              axis: [
                grid.semiMajorAxisAu[0],
                grid.semiMajorAxisAu[grid.semiMajorAxisAu.length - 1],
              ],
            }}
            conditions={conditionRows({
              setting: shownSetting,
              quantity,
              stars: result.stars,
              counted,
              outside,
              merged: live ? setAside('star-already-counted') : result.mergedNames,
              cooling: inputs.cooling,
              shareOutsideMaps,
              answer,
              atTenthOfFloor: live ? live.atTenthOfFloor : result.atTenthOfFloor,
            })}
            announced={announced}
            onDefinition={(next) => onSetting({ ...setting, definition: next })}
          />
        </div>
        <PosteriorChart
          {...posteriorData({
            setting: shownSetting,
            quantity,
            answer,
            zero: counted.length > 0 ? zero : undefined,
            saved: isLive && live && savedQuantity === quantity ? saved.answer : undefined,
          })}
          view={view}
          onViewChange={setView}
        />
      </Plate>
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
              <TextAction icon="undo" onClick={() => mutate()}>
                Fetch again
              </TextAction>
            }
          >
            {sentenceOf(error)} The numbers are those of run {run.number}.
          </Notice>
        </div>
      )}
      <div className="mt-2.5">
        <ResultConsole
          setting={setting}
          saved={inRun}
          quantity={quantityOf(setting.likelihood)}
          grid={grid}
          consequences={consequences ?? undefined}
          profiles={profiles}
          countedLabel={insideCount === 1 ? '1 vetted' : `${insideCount} vetted`}
          onSetting={onSetting}
        />
        {trackFault !== undefined && (
          <p className="mt-2 text-note text-warn" role="status">
            The limits along the tracks could not be computed: {trackFault}. Number and curve follow
            the controls all the same.
          </p>
        )}
        {!maps && error === undefined && (
          <p className="mt-2 text-ink3 text-note" role="status">
            Fetching the maps of {result.stars} stars; until then the numbers are those of run{' '}
            {run.number}.
          </p>
        )}
      </div>
      <ChecksStrip
        inputs={inputs}
        shareOutsideMaps={shareOutsideMaps}
        shareFlaggedCooling={result.shareFlaggedCooling}
        undecidedInside={inputs.undecided
          .filter((candidate) => candidate.insideRanges !== false)
          .map(({ name }) => name)}
        ofRun={isLive ? run.number : undefined}
      />
      <div className="grid min-w-0 gap-x-[60px] md:gap-y-8 xl:grid-cols-[minmax(0,780fr)_minmax(0,520fr)]">
        <SensitivitySection
          map={map}
          stars={result.stars}
          exposure={exposure}
          depth={depth}
          definition={setting.definition}
          companions={inputs.companions}
          onDefinition={(next) => onSetting({ ...setting, definition: next })}
        />
        <div className="grid min-w-0 content-start md:gap-y-8">
          <FoldSection
            number={3}
            title="Limits by credible level"
            answer={[0.9, 0.99]
              .flatMap((level) => {
                const row = stepLevel(level);
                const limit = quantity === 'host_fraction' ? row?.hostFraction : row?.meanNumber;
                return row
                  ? [`${percentBelow(limit ?? null)}\u2009% at ${describeLevel(level)}`]
                  : [];
              })
              .join(', ')}
          >
            <LevelTable
              levels={levels}
              credibleLevel={shownSetting.credibleLevel}
              quantity={quantity}
              detections={counted.length}
              foot={foot}
            />
          </FoldSection>
          <DetectionsSection
            companions={inputs.companions}
            undecided={inputs.undecided}
            counted={counted}
            outside={outside}
            ofRun={isLive ? run.number : undefined}
          />
        </div>
      </div>
      <div className="md:mt-8">
        <StarsSection
          inputs={inputs}
          result={result}
          sample={sample}
          view={outcome?.view}
          setting={shownSetting}
          limit={answer.limit}
          quantity={quantity}
          counted={
            live
              ? live.full.counted.map(({ name, star }) => ({
                  name,
                  starId: inputs.stars[star].starId,
                }))
              : result.counted
          }
        />
      </div>
      <div className="pb-10 md:mt-8">
        <FoldSection
          number={6}
          title="Provenance"
          context={
            isUnsaved || isLive
              ? `run ${run.number}; a live change is not recorded until you save`
              : 'everything this number was made from, unchanged since the run'
          }
          answer={`${steps} steps, unchanged since run ${run.number}`}
        >
          <Provenance collaboration={collaboration} run={run} />
          <ProvenanceDetails run={run} result={result} />
        </FoldSection>
      </div>
      <FootBar>
        <div className="min-w-0 flex-1 leading-[1.2]">
          <b className="block text-[22px] text-bound">
            {answer.isConstrained ? limitText : 'no limit'}
          </b>
          <span className="text-chart text-ink3">
            {describeLevel(shownSetting.credibleLevel)}, <MassRange definition={definition} />,{' '}
            <AxisRange definition={definition} />
          </span>
        </div>
        {props.footActions}
      </FootBar>
    </>
  );
}
