'use client';

import { useMemo } from 'react';
import { CompanionScatter } from '@/components/charts/companion-scatter';
import { IndexPlane } from '@/components/charts/index-plane';
import type { MapData } from '@/components/charts/map-contours';
import { countOf } from '@/components/runs/level-table';
import type { LiveSample } from '@/components/runs/live-sample';
import { TRACK, trackOf } from '@/components/runs/tracks';
import { useLiveTask } from '@/components/runs/use-live-task';
import { FactsStrip } from '@/components/ui/facts-strip';
import { JupiterMass } from '@/components/ui/notation';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { SeriesKey } from '@/components/ui/series-key';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel, describePrior } from '@/lib/inference';
import { fromLogIndex, type PopulationWeights } from '@/lib/population';
import {
  formatLimit,
  formatPercent,
  formatRange,
  formatSignificant,
} from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { BuilderSetting } from './builder-setting';
import { formatIndex } from './law-notation';
import {
  betterStart,
  drawSeen,
  HARDLY_SEEN,
  marginOf,
  PLANETS,
  previewAnswer,
  shareHardlySeen,
} from './preview-figures';

interface BuilderPreviewProps {
  setting: BuilderSetting;
  /** The setting when nothing was being dragged last: slow figures follow it. */
  settled: BuilderSetting;
  sample: LiveSample;
  map: MapData;
  /** Undefined where the population lies outside the maps. */
  weights: PopulationWeights | null;
  /** "A-31, run 18": whose maps these are. */
  source: string;
  onDefinition(definition: PowerLawDefinition, isSettled: boolean): void;
}

/** What the surveys would see of the population, and what it would mean for the limit. */
export function BuilderPreview(props: BuilderPreviewProps) {
  const { setting, settled, sample, map, weights, source, onDefinition } = props;
  const { definition, prior, credibleLevel } = setting;
  const planets = useMemo(() => drawSeen(definition, map), [definition, map]);
  const seen = planets.isSeen.reduce((sum, value) => sum + value, 0);
  const margins = useMemo(
    () =>
      weights && {
        mass: marginOf(definition, map, weights, 'mass'),
        semiMajorAxis: marginOf(definition, map, weights, 'semiMajorAxis'),
      },
    [definition, map, weights],
  );
  const answer = useMemo(
    () => previewAnswer(sample, { definition, prior, credibleLevel }),
    [sample, definition, prior, credibleLevel],
  );
  const stars = sample.stars.length;
  const subject = `mean completeness of ${stars} stars`;

  return (
    <div className="min-w-0">
      <section>
        <SectionOpener
          title={`${PLANETS} planets drawn from it`}
          context={`over the ${subject}, from ${source}`}
          tools={
            <>
              <SeriesKey shape="dot" colour="var(--ink)">
                seen, {seen}
              </SeriesKey>
              <SeriesKey shape="ring" colour="var(--ink)">
                missed, {PLANETS - seen}
              </SeriesKey>
            </>
          }
        />
        <CompanionScatter
          map={map}
          subject={subject}
          companions={planets}
          range={definition}
          onRangeChange={(range, isSettled) => onDefinition({ ...definition, ...range }, isSettled)}
          massMargin={margins?.mass}
          semiMajorAxisMargin={margins?.semiMajorAxis}
        />
      </section>
      <div className="mt-5">
        {answer ? (
          <PreviewFacts answer={answer} setting={setting} stars={stars} />
        ) : (
          <Notice tone="bad" title="No maps reach this population.">
            Its ranges lie entirely outside the map grid,{' '}
            {formatRange(map.massMjup[0], map.massMjup[map.massMjup.length - 1], 'MJ')} and{' '}
            {formatRange(
              map.semiMajorAxisAu[0],
              map.semiMajorAxisAu[map.semiMajorAxisAu.length - 1],
              'AU',
            )}
            .
          </Notice>
        )}
        {weights && (
          <Warnings
            map={map}
            weights={weights}
            definition={definition}
            sample={sample}
            setting={settled}
            onDefinition={(next) => onDefinition(next, true)}
          />
        )}
      </div>
      <Plane sample={sample} setting={settled} here={setting} />
    </div>
  );
}

function PreviewFacts({
  answer,
  setting,
  stars,
}: {
  answer: NonNullable<ReturnType<typeof previewAnswer>>;
  setting: BuilderSetting;
  stars: number;
}) {
  const { view, withDetections, zero } = answer;
  const level = describeLevel(setting.credibleLevel);
  const limit = (of: typeof zero) =>
    of === null || !of.posterior.constrained ? 'none' : formatLimit(of.limit, 'host_fraction');
  return (
    <>
      <FactsStrip
        facts={[
          { name: 'mean detection probability', value: formatPercent(view.exposure / stars) },
          {
            name: 'sum over stars',
            value: formatSignificant(view.exposure, 3),
            note: `of ${stars}`,
          },
          {
            name: 'expected detections',
            label: (
              <>
                detections if <i>f</i> were{' '}
                {formatPercent(setting.statedFraction).replace('.0', '')}
              </>
            ),
            value: formatSignificant(setting.statedFraction * view.exposure, 2),
          },
          {
            name: `${level}, ${countOf(withDetections?.counted.length ?? 0)}`,
            value: limit(withDetections),
            isBound: true,
          },
          { name: `${level}, zero detections`, value: limit(zero), isBound: true },
        ]}
      />
      <p className="-mt-1.5 mb-3 text-chart text-ink3">
        Limits: {describePrior(setting.prior, 'host_fraction')}; every star once.
      </p>
    </>
  );
}

function Warnings({
  map,
  weights,
  definition,
  sample,
  setting,
  onDefinition,
}: {
  map: MapData;
  weights: PopulationWeights;
  definition: PowerLawDefinition;
  sample: LiveSample;
  setting: BuilderSetting;
  onDefinition(definition: PowerLawDefinition): void;
}) {
  const share = shareHardlySeen(map, weights);
  const better = useMemo(() => {
    if (share < 0.01) return null;
    const start = betterStart(map, definition);
    if (!start) return null;
    const answer = previewAnswer(sample, {
      definition: { ...definition, massMinMjup: start.massMinMjup },
      prior: setting.prior,
      credibleLevel: setting.credibleLevel,
    })?.withDetections;
    return { ...start, limit: answer?.limit };
  }, [share, map, definition, sample, setting.prior, setting.credibleLevel]);
  return (
    <div className="grid gap-2">
      {weights.shareOutsideMap > 0.0005 && (
        <Notice
          tone="warn"
          title={`${formatPercent(weights.shareOutsideMap)} of this population lies beyond the map grid.`}
        >
          Nothing counts as seen there. A run is refused until its analysis says that this is meant.
        </Notice>
      )}
      {share >= 0.01 && (
        <Notice
          tone="warn"
          title={`${formatPercent(share)} of this population lies where the mean detection probability is under ${formatPercent(HARDLY_SEEN, 1)}.`}
          actions={
            better && (
              <TextAction
                onClick={() => onDefinition({ ...definition, massMinMjup: better.massMinMjup })}
              >
                <span>
                  Start at {better.massMinMjup} <JupiterMass />
                </span>
              </TextAction>
            )
          }
        >
          There the limit rests on the indices, not on data.
          {better && (
            <>
              {' '}
              From {better.massMinMjup} <JupiterMass /> up the share is under 1{'\u2009'}%
              {better.limit !== undefined &&
                ` and, with the same indices, the limit ${formatLimit(better.limit, 'host_fraction')}`}
              .
            </>
          )}
        </Notice>
      )}
    </div>
  );
}

function Plane({
  sample,
  setting,
  here,
}: {
  sample: LiveSample;
  setting: BuilderSetting;
  here: BuilderSetting;
}) {
  const { definition, prior, credibleLevel } = setting;
  const alpha = fromLogIndex(here.definition.massIndex, 'linear');
  const beta = fromLogIndex(here.definition.semiMajorAxisIndex, 'linear');
  // The plane does not depend on where in it the present indices lie, only on whether they do.
  const [massFrom, massTo] = trackOf(TRACK.massIndex, alpha);
  const [axisFrom, axisTo] = trackOf(TRACK.semiMajorAxisIndex, beta);
  const { answer: plane, fault } = useLiveTask(
    sample,
    'limitPlane',
    { definition: { ...definition, massIndex: 0, semiMajorAxisIndex: 0 }, prior, credibleLevel },
    { massIndex: [massFrom, massTo], semiMajorAxisIndex: [axisFrom, axisTo] },
  );
  const present = useMemo(
    () => previewAnswer(sample, here)?.withDetections ?? null,
    [sample, here],
  );
  const level = describeLevel(credibleLevel);
  return (
    <section className="mt-7">
      <SectionOpener
        title={`${level} limit over both indices`}
        context={`${countOf(present?.counted.length ?? 0)}; ${describePrior(prior, 'host_fraction')}; linear indices`}
      />
      {plane && present ? (
        <IndexPlane
          {...plane}
          here={{
            massIndex: Number(alpha.toFixed(6)),
            semiMajorAxisIndex: Number(beta.toFixed(6)),
            limit: present.limit,
          }}
          quantity="host_fraction"
          levelLabel={level}
        />
      ) : plane === undefined && present ? (
        <p className="text-ink2 text-note" role="status">
          {fault === undefined ? 'Computing the limit over both indices.' : `No plane: ${fault}.`}
        </p>
      ) : (
        <p className="text-ink2 text-note">
          No limit at <i>α</i> = {formatIndex(alpha)}, <i>β</i> = {formatIndex(beta)}: nothing of
          this population can be seen, or a detection lies where its star's map sees nothing.
        </p>
      )}
    </section>
  );
}
