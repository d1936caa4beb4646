'use client';

import { NumberEntry } from '@/components/analyses/number-entry';
import { priorLaws, priorOfLaw, priorOptions } from '@/components/analyses/prior-choice';
import { PriorNumbers } from '@/components/analyses/prior-numbers';
import { tidy } from '@/components/runs/live-setting';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { BuilderPart } from './builder-part';
import type { PreviewSetting } from './builder-setting';

interface FractionPartProps<S extends PreviewSetting> {
  number: number;
  setting: S;
  onSetting(setting: S, isSettled: boolean): void;
}

/** The prior of the preview: a population does not hold one. */
export function FractionPart<S extends PreviewSetting>(props: FractionPartProps<S>) {
  const { number, setting, onSetting } = props;
  return (
    <BuilderPart
      number={number}
      title={
        <>
          Host fraction <i>f</i>
        </>
      }
      form="for this preview"
    >
      <div className="grid gap-3">
        <ConsequenceSwitch
          help="occurrence-rate"
          label={
            <>
              Prior of <i>f</i>
            </>
          }
          isLabelHidden
          isWide
          size="small"
          value={setting.prior.law}
          onChange={(law) =>
            onSetting({ ...setting, prior: priorOfLaw(law, 'host-fraction', setting.prior) }, true)
          }
          options={priorOptions(priorLaws('host-fraction'))}
        />
        <div className="grid grid-cols-2 gap-4">
          <PriorNumbers
            prior={setting.prior}
            likelihood="host-fraction"
            onChange={(prior) => onSetting({ ...setting, prior }, true)}
          />
          <NumberEntry
            label="If f were"
            unit="%"
            value={tidy(100 * setting.statedFraction)}
            isAllowed={(percent) => percent > 0 && percent <= 100}
            expected="Above 0, at most 100 %."
            onValue={(percent) =>
              onSetting({ ...setting, statedFraction: tidy(percent / 100) }, true)
            }
          />
        </div>
        <p className="text-chart text-ink3">
          An analysis chooses its own prior; the population does not hold one.
        </p>
      </div>
    </BuilderPart>
  );
}
