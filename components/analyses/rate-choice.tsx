'use client';

import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { SectionOpener } from '@/components/ui/section-opener';
import type { Likelihood, RatePrior } from '@/lib/inference';
import { NumberEntry } from './number-entry';
import { fitPrior, priorLaws, priorOfLaw, priorOptions } from './prior-choice';
import { PriorNumbers } from './prior-numbers';

export interface RateSetting {
  likelihood: Likelihood;
  prior: RatePrior;
  credibleLevel: number;
}

export function RateChoice({
  onChange,
  ...setting
}: RateSetting & { onChange(setting: RateSetting): void }) {
  const { likelihood, prior, credibleLevel } = setting;
  return (
    <section>
      <SectionOpener number={4} title="Likelihood, prior and level" />
      <div className="grid gap-4">
        <ConsequenceSwitch
          label="What the rate counts"
          value={likelihood}
          onChange={(next) =>
            onChange({ ...setting, likelihood: next, prior: fitPrior(prior, next) })
          }
          options={[
            { value: 'host-fraction', label: 'fraction of stars with a planet' },
            { value: 'mean-number', label: 'planets per star (Poisson)' },
          ]}
        />
        <ConsequenceSwitch
          label={likelihood === 'host-fraction' ? 'Prior on f' : 'Prior on the mean number'}
          value={prior.law}
          onChange={(law) => onChange({ ...setting, prior: priorOfLaw(law, likelihood, prior) })}
          options={priorOptions(priorLaws(likelihood))}
        />
        <div className="grid max-w-[26rem] grid-cols-2 gap-4">
          <PriorNumbers
            prior={prior}
            likelihood={likelihood}
            onChange={(next) => onChange({ ...setting, prior: next })}
          />
          <NumberEntry
            label="Credible level"
            unit="%"
            value={Number((100 * credibleLevel).toPrecision(6))}
            isAllowed={(percent) => percent > 0 && percent < 100}
            expected="Above 0 and below 100 %."
            onValue={(percent) => onChange({ ...setting, credibleLevel: percent / 100 })}
          />
        </div>
      </div>
    </section>
  );
}
