'use client';

import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { SectionOpener } from '@/components/ui/section-opener';
import type { Likelihood, RatePrior } from '@/lib/inference';
import { BackgroundEntry } from './background-entry';
import { NumberEntry } from './number-entry';
import { fitLikelihood, priorLaws, priorOfLaw, priorOptions } from './prior-choice';
import { PriorNumbers } from './prior-numbers';
import { NO_TABLE } from './prior-of-run';
import { RunPriorChoice } from './run-prior-choice';

export interface RateSetting {
  likelihood: Likelihood;
  prior: RatePrior;
  credibleLevel: number;
  /** Expected false detections among those counted; mean number only. */
  background?: number;
}

interface RateChoiceProps extends RateSetting {
  collaboration: string;
  /** Ids of the chosen surveys. */
  surveyIds: string[];
  onChange(setting: RateSetting): void;
}

export function RateChoice({ onChange, collaboration, surveyIds, ...setting }: RateChoiceProps) {
  const { likelihood, prior, credibleLevel, background } = setting;
  return (
    <section>
      <SectionOpener number={4} title="Likelihood, prior and level" help="prior" />
      <div className="grid gap-4">
        <ConsequenceSwitch
          help="likelihood"
          label="What the rate counts"
          value={likelihood}
          onChange={(next) =>
            onChange({
              ...setting,
              likelihood: next,
              prior: fitLikelihood(prior, likelihood, next),
              background: next === 'mean-number' ? background : undefined,
            })
          }
          options={[
            { value: 'host-fraction', label: 'fraction of stars with a planet' },
            { value: 'mean-number', label: 'planets per star (Poisson)' },
          ]}
        />
        <ConsequenceSwitch
          label={likelihood === 'host-fraction' ? 'Prior on f' : 'Prior on the mean number'}
          value={prior.law}
          onChange={(law) =>
            onChange({
              ...setting,
              prior: law === 'tabulated' ? NO_TABLE : priorOfLaw(law, likelihood, prior),
            })
          }
          options={priorOptions([...priorLaws(likelihood), 'tabulated'])}
        />
        {prior.law === 'tabulated' && (
          <RunPriorChoice
            collaboration={collaboration}
            likelihood={likelihood}
            prior={prior}
            surveyIds={surveyIds}
            onChange={(next) => onChange({ ...setting, prior: next })}
          />
        )}
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
          {likelihood === 'mean-number' && (
            <BackgroundEntry
              value={background}
              onValue={(next) => onChange({ ...setting, background: next })}
            />
          )}
        </div>
      </div>
    </section>
  );
}
