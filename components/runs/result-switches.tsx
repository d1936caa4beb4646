'use client';

import { NumberEntry } from '@/components/analyses/number-entry';
import { likelihoodOptions, type PriorLaw, priorOptions } from '@/components/analyses/prior-choice';
import { ConsequenceSwitch, type SwitchOption } from '@/components/ui/consequence-switch';
import type { RateQuantity } from '@/lib/inference';
import { formatSignificant } from '@/lib/quantities/display';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import { CandidateSwitch } from './candidate-switch';
import { type Consequences, lawsOffered, priorChosen } from './consequences';
import { modelLabel } from './input-choices';
import { type LiveSetting, withInputs, withLikelihood } from './live-setting';

export interface ResultSwitchesProps {
  setting: LiveSetting;
  saved: LiveSetting;
  quantity: RateQuantity;
  /** Undefined until the maps of the run are there; null where the setting has none. */
  consequences: Consequences | null | undefined;
  /** Candidates without an answer in the sample. */
  candidates: number;
  /** Other ages and cooling models, where maps are kept for them. */
  inputs?: AgesCoolingAnswer;
  /** "2 vetted": what counting them means here. */
  countedLabel: string;
  /** Of those that a narrow screen shows only when it is asked for more. */
  further: string;
  onSetting(setting: LiveSetting): void;
}

/** The choices that have no scale, each option over the limit that it would give. */
export function ResultSwitches(props: ResultSwitchesProps) {
  const { setting, saved, quantity, consequences, countedLabel, further, onSetting } = props;
  const models = props.inputs?.result.models ?? [];
  const wide = `max-md:w-full ${further}`;
  const consequence = (value: number | undefined) => {
    if (consequences === undefined) return 'pending';
    return value === undefined ? undefined : formatSignificant(100 * value, 2);
  };

  return (
    <>
      <ConsequenceSwitch
        label="Detections counted"
        help="detection"
        value={setting.detections}
        onChange={(detections) => onSetting({ ...setting, detections })}
        options={[
          {
            value: 'counted',
            label: countedLabel,
            consequence: consequence(consequences?.switches.detections.counted),
          },
          {
            value: 'none',
            label: 'none',
            consequence: consequence(consequences?.switches.detections.none),
          },
        ]}
      />
      {props.candidates > 0 && (
        <div className={wide}>
          <CandidateSwitch
            setting={setting}
            saved={saved}
            consequence={(choice) => consequence(consequences?.switches.candidates[choice])}
            onSetting={onSetting}
          />
        </div>
      )}
      {models.length > 1 && (
        <div className={wide}>
          <ConsequenceSwitch
            label="Cooling model"
            help="cooling-model"
            value={setting.cooling ?? COOLING_AS_RUN}
            onChange={(cooling) => onSetting(withInputs(setting, { cooling }))}
            options={models.map((model) => ({
              value: model.model,
              label: <span title={model.name}>{modelLabel(model, models)}</span>,
              consequence: consequence(consequences?.switches.cooling[model.model]),
            }))}
          />
        </div>
      )}
      <ConsequenceSwitch
        label="Likelihood"
        help="likelihood"
        value={setting.likelihood}
        onChange={(likelihood) => onSetting(withLikelihood(setting, likelihood, saved))}
        options={withConsequences(likelihoodOptions, (value) =>
          consequence(consequences?.switches.likelihood[value]),
        )}
      />
      <div className={wide}>
        <ConsequenceSwitch
          help="prior"
          label={
            quantity === 'host_fraction' ? (
              <>
                Prior on <i>f</i>
              </>
            ) : (
              'Prior on the mean number'
            )
          }
          value={setting.prior.law}
          onChange={(law) => onSetting({ ...setting, prior: priorChosen(law, setting, saved) })}
          options={withConsequences(
            priorOptions(lawsOffered(setting, saved)).map(shortened),
            (value) => consequence(consequences?.switches.prior[value]),
          )}
        />
      </div>
      {setting.prior.law === 'log-uniform' && (
        <div className={`w-28 ${further}`}>
          <FloorEntry setting={setting} onSetting={onSetting} />
        </div>
      )}
    </>
  );
}

interface FloorEntryProps {
  setting: LiveSetting;
  onSetting(setting: LiveSetting): void;
}

function FloorEntry({ setting, onSetting }: FloorEntryProps) {
  const { prior } = setting;
  if (prior.law !== 'log-uniform') return null;
  return (
    <NumberEntry
      label="Floor"
      value={prior.min}
      isAllowed={(min) => min > 0 && min < prior.max}
      expected={`Above 0, below ${prior.max}.`}
      onValue={(min) => onSetting({ ...setting, prior: { ...prior, min } })}
    />
  );
}

/** Four options with their limits share 346 px: the longest name is cut for the eye alone. */
function shortened(option: SwitchOption<PriorLaw>): SwitchOption<PriorLaw> {
  if (option.value !== 'log-uniform') return option;
  return {
    ...option,
    label: (
      <>
        log<span className="max-md:sr-only">-uniform</span>
      </>
    ),
  };
}

function withConsequences<Value extends string>(
  options: SwitchOption<Value>[],
  of: (value: Value) => string | undefined,
): SwitchOption<Value>[] {
  return options.map((option) => ({ ...option, consequence: of(option.value) }));
}
