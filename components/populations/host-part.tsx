'use client';

import { NumberEntry } from '@/components/analyses/number-entry';
import type { LiveSample } from '@/components/runs/live-sample';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { BuilderPart } from './builder-part';
import type { BuilderSetting } from './builder-setting';
import { definitionOf, type LawParts } from './law-parts';
import { ParameterSlider } from './parameter-slider';
import { ScalingWords } from './shape-words';

interface HostPartProps {
  number: number;
  setting: BuilderSetting;
  parts: LawParts;
  saved?: LawParts;
  settled: BuilderSetting;
  sample: LiveSample | undefined;
  onSetting(setting: BuilderSetting, isSettled: boolean): void;
}

const GAMMA_TRACK = [-2, 3] as const;
const same = (value: number) => value;

/** Whether the rate is the same around every star, or grows with the mass of the star. */
export function HostPart(props: HostPartProps) {
  const { number, setting, parts, saved, settled, sample, onSetting } = props;
  const { hostScaling } = parts;
  const change = (next: LawParts['hostScaling'], isSettled: boolean) => {
    const { hostScaling: _, ...rest } = parts;
    const definition = definitionOf(next ? { ...rest, hostScaling: next } : rest);
    onSetting({ ...setting, definition }, isSettled);
  };
  return (
    <BuilderPart number={number} title="Stars">
      <ConsequenceSwitch
        help="host-mass-scaling"
        label="How the rate depends on the star"
        isLabelHidden
        isWide
        size="small"
        value={hostScaling ? 'scaled' : 'same'}
        options={[
          { value: 'same', label: 'same for all' },
          { value: 'scaled', label: 'scales with stellar mass' },
        ]}
        onChange={(value) =>
          change(value === 'same' ? undefined : { index: 1, referenceMsun: 1 }, true)
        }
      />
      {hostScaling ? (
        <>
          <p className="mt-2.5 mb-2 text-note">
            <ScalingWords {...hostScaling} />
          </p>
          <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
            <ParameterSlider
              name="Host-mass index"
              symbol="γ"
              label={
                <>
                  index <i>γ</i>
                </>
              }
              parameter={{ part: 'host', field: 'index' }}
              settled={settled}
              sample={sample}
              value={hostScaling.index}
              savedValue={saved?.hostScaling?.index}
              track={GAMMA_TRACK}
              step={0.05}
              toShown={same}
              fromShown={same}
              onChange={(index, isSettled) => change({ ...hostScaling, index }, isSettled)}
            />
            <NumberEntry
              label="Reference mass"
              unit="solar masses"
              hint="The rate is quoted for stars of this mass."
              value={hostScaling.referenceMsun}
              isAllowed={(mass) => mass > 0 && mass <= 100}
              expected="Above 0, at most 100."
              onValue={(referenceMsun) => change({ ...hostScaling, referenceMsun }, true)}
            />
          </div>
        </>
      ) : (
        <p className="mt-2 text-ink2 text-note">
          Every star has the same rate
          {parts.isRatio ? '; the range of masses is each star’s own.' : '.'}
        </p>
      )}
    </BuilderPart>
  );
}
