import { countOf } from '@/components/runs/level-table';
import { FactsStrip } from '@/components/ui/facts-strip';
import { describeLevel, describePrior, describeStars } from '@/lib/inference';
import { hostScalingOf, type Population } from '@/lib/population';
import { formatLimit, formatPercent, formatSignificant } from '@/lib/quantities/display';
import type { PreviewSetting } from './builder-setting';
import type { PreviewAnswer } from './preview-figures';

interface PreviewFactsProps {
  answer: PreviewAnswer;
  population: Population;
  setting: PreviewSetting;
  stars: number;
}

/** What the surveys would see of the population, and the limit that it would give. */
export function PreviewFacts({ answer, population, setting, stars }: PreviewFactsProps) {
  const { view, withDetections, zero } = answer;
  const level = describeLevel(setting.credibleLevel);
  const isSystems = population.form === 'systems';
  const isScaled = hostScalingOf(population) !== null;
  const limit = (of: typeof zero) =>
    of === null || !of.posterior.constrained ? 'none' : formatLimit(of.limit, 'host_fraction');
  const plain = view.completenessPerStar?.reduce((sum, seen) => sum + seen, 0) ?? view.exposure;
  const systemsSeen = view.numberSeenPerStar?.reduce((sum, seen) => sum + seen, 0);
  const cutAt = (withDetections ?? zero)?.posterior.cutAt ?? null;
  return (
    <>
      <FactsStrip
        facts={[
          {
            name: isSystems ? 'a system would show itself' : 'mean detection probability',
            value: formatPercent(plain / stars),
          },
          ...(systemsSeen === undefined
            ? []
            : [
                {
                  name: 'companions seen per system',
                  value: formatSignificant(systemsSeen / stars, 2),
                },
              ]),
          {
            name: isScaled ? 'sum, each star by its rate' : 'sum over stars',
            value: formatSignificant(view.exposure, 3),
            note: `of ${stars}`,
          },
          {
            name: 'expected detections',
            help: 'detection-counts',
            label: (
              <>
                {isSystems ? 'hosts found' : 'detections'} if <i>f</i> were{' '}
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
        Limits: {describePrior(setting.prior, 'host_fraction')}; every star once
        {isScaled && `; the fraction is that of ${describeStars(population)}`}
        {cutAt !== null &&
          `; prior cut at ${formatPercent(cutAt)}, above which one star’s own fraction would exceed 1`}
        .
      </p>
    </>
  );
}
