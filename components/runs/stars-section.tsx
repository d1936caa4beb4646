'use client';

import { useMemo, useState } from 'react';
import { seriesColour } from '@/components/charts/series';
import { halfOfTheSum, StarDots } from '@/components/charts/star-dots';
import { FoldSection } from '@/components/ui/fold-section';
import { SelectField } from '@/components/ui/select-field';
import { SeriesKey } from '@/components/ui/series-key';
import { answerFromView, type PopulationView, type RateQuantity } from '@/lib/inference';
import { formatLimit, formatPercent } from '@/lib/quantities/display';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';
import { askedOf, orNull } from './live-answer';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

interface StarsSectionProps {
  inputs: RunInputs;
  result: RunResult;
  /** Undefined until the maps are there: then the run's own numbers are shown. */
  sample?: LiveSample;
  view?: PopulationView;
  setting: LiveSetting;
  limit: number;
  quantity: RateQuantity;
  counted: { name: string; starId: string }[];
}

/** A dot a star; one of them chosen says what the limit would be without it. */
export function StarsSection(props: StarsSectionProps) {
  const { inputs, result, sample, view, setting, limit, quantity, counted } = props;
  const [chosen, setChosen] = useState('');
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
  const without = useMemo(
    () => (sample && view ? limitWithout(sample, view, setting, chosen) : undefined),
    [sample, view, setting, chosen],
  );
  const star = stars.find(({ name }) => name === chosen);

  return (
    <FoldSection
      number={5}
      title="Which stars carry the limit"
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
      <StarDots stars={stars} selected={chosen || undefined} onSelect={setChosen} />
      <div className="mt-3 flex flex-wrap items-end gap-x-6 gap-y-2 text-note">
        <div className="w-60">
          <SelectField
            label="Limit without one star"
            value={chosen}
            onChange={(event) => setChosen(event.target.value)}
            options={[
              { value: '', label: 'choose a star, or press its dot' },
              ...[...stars]
                .sort((a, b) => b.probability - a.probability)
                .map(({ name, probability }) => ({
                  value: name,
                  label: `${name}, ${formatPercent(probability)}`,
                })),
            ]}
          />
        </div>
        {star && (
          <p className="pb-2" aria-live="polite">
            {without === undefined
              ? `Without ${star.name} there is no answer to compare with.`
              : `Without ${star.name}: `}
            {without !== undefined && (
              <>
                <span className="limit">{formatLimit(without, quantity)}</span>
                {` instead of ${formatLimit(limit, quantity)}`}
              </>
            )}
          </p>
        )}
      </div>
    </FoldSection>
  );
}

/** The limit of the sample without one star and without its detections. */
function limitWithout(
  sample: LiveSample,
  view: PopulationView,
  setting: LiveSetting,
  name: string,
): number | undefined {
  const left = sample.stars.findIndex((star) => star.name === name);
  const { completenessPerStar } = view;
  if (left < 0 || !completenessPerStar) return undefined;
  const kept = completenessPerStar.filter((_, star) => star !== left);
  const asked = askedOf(sample, setting);
  const detections = asked.detections
    .filter(({ star }) => star !== left)
    .map((detection) => ({
      ...detection,
      star: detection.star > left ? detection.star - 1 : detection.star,
    }));
  const rest = {
    ...view,
    completenessPerStar: kept,
    exposure: view.exposure - completenessPerStar[left],
    stars: view.stars - 1,
  };
  return orNull(() => answerFromView(rest, { ...asked, detections }).limit) ?? undefined;
}
