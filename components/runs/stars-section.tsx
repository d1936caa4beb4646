'use client';

import { useMemo, useState } from 'react';
import { seriesColour } from '@/components/charts/series';
import { halfOfTheSum, StarDots } from '@/components/charts/star-dots';
import { FoldSection } from '@/components/ui/fold-section';
import { SeriesKey } from '@/components/ui/series-key';
import type { PopulationView, RateQuantity } from '@/lib/inference';
import type { DrawnInputs, DrawnResult } from '@/lib/schemas/runs';
import { LeaveOut } from './leave-out';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

interface StarsSectionProps {
  inputs: DrawnInputs;
  result: DrawnResult;
  /** Undefined until the maps are there: then the run's own numbers are shown. */
  sample?: LiveSample;
  view?: PopulationView;
  /** None where no control knows the population: then no limit is shown without some stars. */
  setting?: LiveSetting;
  /** Beside a setting: the run whose stars may be left out. */
  runNumber?: number;
  limit: number;
  quantity: RateQuantity;
  counted: { name: string; starId: string }[];
}

/** A dot a star; those chosen say what the limit would be without them. */
export function StarsSection(props: StarsSectionProps) {
  const { inputs, result, sample, view, setting, limit, quantity, counted } = props;
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const hostsOf = counted.map(({ name, starId }) => `${starId} ${name}`).join('|');
  const stars = useMemo(() => {
    const positions = new Map(inputs.surveys.map((survey) => [survey.id, survey.position]));
    const hosts = new Map<string, string[]>();
    for (const pair of hostsOf === '' ? [] : hostsOf.split('|')) {
      const at = pair.indexOf(' ');
      const id = pair.slice(0, at);
      hosts.set(id, [...(hosts.get(id) ?? []), pair.slice(at + 1)]);
    }
    const stored = new Map(result.starTable.map((star) => [star.starId, star.probability]));
    const perStar = view?.completenessPerStar;
    return inputs.stars.map((star, index) => ({
      name: star.name,
      probability: perStar ? perStar[index] : (stored.get(star.starId) ?? 0),
      seriesIndex: star.surveys.length === 1 ? positions.get(star.surveys[0]) : undefined,
      hosts: hosts.get(star.starId)?.join(', '),
    }));
  }, [inputs, result, view, hostsOf]);
  const half = useMemo(() => halfOfTheSum(stars), [stars]);

  return (
    <FoldSection
      number={5}
      title="Which stars carry the limit"
      help="influence"
      context="one dot a star"
      answer={`${half.stars} of ${stars.length} carry half of it`}
      tools={
        <>
          {inputs.surveys.map((survey) => (
            <SeriesKey key={survey.id} shape="dot" colour={seriesColour(survey.position)}>
              {survey.name}
            </SeriesKey>
          ))}
          {inputs.surveys.length > 1 && (
            <SeriesKey shape="dot" colour="var(--ink)">
              in several, counted once
            </SeriesKey>
          )}
        </>
      }
    >
      <StarDots stars={stars} selected={chosen} onSelect={(names) => setChosen(new Set(names))} />
      {setting && props.runNumber !== undefined && (
        <LeaveOut
          runNumber={props.runNumber}
          {...{ inputs, stars, sample, view, setting, limit, quantity, chosen }}
          onChosen={setChosen}
        />
      )}
    </FoldSection>
  );
}
