'use client';

import { useEffect, useMemo, useState } from 'react';
import type { StarDot } from '@/components/charts/star-dots';
import { SelectField } from '@/components/ui/select-field';
import { TextAction } from '@/components/ui/text-action';
import type { PopulationView, RateQuantity } from '@/lib/inference';
import { describeLevel } from '@/lib/inference';
import { formatLimit, formatPercent } from '@/lib/quantities/display';
import type { DrawnInputs } from '@/lib/schemas/runs';
import { keptFromHash, keptToHash } from './kept-address';
import { limitWithout, withoutWords } from './limit-without';
import type { LiveSample } from './live-sample';
import type { LiveSetting } from './live-setting';

interface LeaveOutProps {
  inputs: DrawnInputs;
  runNumber: number;
  stars: StarDot[];
  /** Undefined until the maps are there. */
  sample?: LiveSample;
  view?: PopulationView;
  setting: LiveSetting;
  limit: number;
  quantity: RateQuantity;
  chosen: ReadonlySet<string>;
  onChosen(names: ReadonlySet<string>): void;
}

const choose = 'choose, press a dot or frame dots';

/** The limit without some stars, and those answers that are kept to compare with. */
export function LeaveOut(props: LeaveOutProps) {
  const { inputs, stars, sample, view, setting, limit, quantity, chosen, onChosen } = props;
  const [kept, setKept] = useKept(props.runNumber, inputs);
  // Hundreds of choices, none of which has an answer before the maps are there.
  const isReady = sample !== undefined;
  const groups = useMemo(() => (isReady ? groupsOf(inputs, stars) : []), [isReady, inputs, stars]);
  const without = useMemo(
    () => (sample && view ? limitWithout(sample, view, setting, chosen) : undefined),
    [sample, view, setting, chosen],
  );
  const picked = groups.find(({ names }) => isSame(names, chosen));
  const level = describeLevel(setting.credibleLevel);
  const words = without && withoutWords(without, picked?.name);
  return (
    <div className="mt-3 grid gap-3 text-note">
      <div className="flex flex-wrap items-end gap-x-6 gap-y-2">
        <div className="w-80 max-w-full">
          <SelectField
            label="Limit without some stars"
            value={picked?.value ?? ''}
            onChange={(event) =>
              onChosen(groups.find(({ value }) => value === event.target.value)?.names ?? new Set())
            }
            options={[
              { value: '', label: chosen.size > 0 ? `${chosen.size} stars of a frame` : choose },
              ...groups.map(({ value, label }) => ({ value, label })),
            ]}
          />
        </div>
        {chosen.size > 0 && (
          <p className="min-w-0 pb-2" aria-live="polite">
            {without === undefined || words === undefined ? (
              'Without these stars there is no answer to compare with.'
            ) : (
              <>
                Without {words}:{' '}
                <span className="limit">{formatLimit(without.limit, quantity)}</span> ({level})
                instead of {formatLimit(limit, quantity)}
              </>
            )}
          </p>
        )}
        {chosen.size > 0 && without && words && (
          <span className="flex gap-4 pb-1.5">
            {!kept.some((names) => isSame(names, chosen)) && (
              <TextAction icon="compare" onClick={() => setKept([...kept, chosen])}>
                Keep as a comparison
              </TextAction>
            )}
            <TextAction icon="undo" onClick={() => onChosen(new Set())}>
              Choose none
            </TextAction>
          </span>
        )}
      </div>
      {kept.length > 0 && sample && view && (
        <KeptAnswers
          {...props}
          sample={sample}
          view={view}
          kept={kept}
          groups={groups}
          onDrop={(names) => setKept(kept.filter((one) => one !== names))}
        />
      )}
    </div>
  );
}

/** Sets of stars that are kept to compare with: the address of the page carries them. */
function useKept(run: number, inputs: DrawnInputs) {
  const names = useMemo(() => inputs.stars.map(({ name }) => name), [inputs]);
  const [kept, setKept] = useState<readonly ReadonlySet<string>[]>([]);
  // Not before the first paint: the server has drawn it, and does not know this part of the address.
  useEffect(() => setKept(keptFromHash(run, names, window.location.hash)), [run, names]);
  const keep = (next: readonly ReadonlySet<string>[]) => {
    setKept(next);
    const { pathname, search } = window.location;
    window.history.replaceState(null, '', `${pathname}${search}${keptToHash(run, names, next)}`);
  };
  return [kept, keep] as const;
}

/** Each follows the controls; they are not part of the run. */
function KeptAnswers(
  props: LeaveOutProps & {
    sample: LiveSample;
    view: PopulationView;
    kept: readonly ReadonlySet<string>[];
    groups: Group[];
    onDrop(names: ReadonlySet<string>): void;
  },
) {
  const { sample, view, setting, kept, groups, quantity, limit, onDrop, onChosen } = props;
  return (
    <ul className="grid gap-1 border-rule border-t pt-2">
      <li className="text-ink3">
        Kept beside {formatLimit(limit, quantity)} of all {view.stars} stars, all at{' '}
        {describeLevel(setting.credibleLevel)}; they follow the controls and stand in the address of
        this page, and no run records them
      </li>
      {kept.map((names) => {
        const answer = limitWithout(sample, view, setting, names);
        const group = groups.find((one) => isSame(one.names, names));
        const left = answer ?? { stars: names.size, detections: [] };
        const name = withoutWords(left, group?.name);
        return (
          <li key={[...names].join()} className="flex flex-wrap items-baseline gap-x-4">
            <span className="limit w-28 text-right">
              {answer ? formatLimit(answer.limit, quantity) : 'no answer'}
            </span>
            <button type="button" className="text-act" onClick={() => onChosen(names)}>
              without {name}
            </button>
            <span className="text-ink3">
              {answer && limit > 0 ? `${(answer.limit / limit).toFixed(2)} times the limit` : ''}
            </span>
            <TextAction icon="close" onClick={() => onDrop(names)}>
              Drop
            </TextAction>
          </li>
        );
      })}
    </ul>
  );
}

interface Group {
  value: string;
  label: string;
  name: string;
  names: ReadonlySet<string>;
}

/** Surveys, hosts, then star by star: what the keyboard chooses where the pointer draws a frame. */
function groupsOf(inputs: DrawnInputs, stars: StarDot[]): Group[] {
  const ofSurvey = inputs.surveys.map(({ id, name }): Group => {
    const names = inputs.stars.filter(({ surveys }) => surveys.includes(id)).map((one) => one.name);
    return {
      value: `survey ${id}`,
      label: `all ${names.length} stars of ${name}`,
      name: `the ${names.length} stars of ${name}`,
      names: new Set(names),
    };
  });
  const hosts = stars.filter(({ hosts: of }) => of !== undefined).map(({ name }) => name);
  const single = [...stars]
    .sort((a, b) => b.probability - a.probability)
    .map(
      ({ name, probability }): Group => ({
        value: `star ${name}`,
        label: `${name}, ${formatPercent(probability)}`,
        name,
        names: new Set([name]),
      }),
    );
  const all = hosts.length > 1 ? [groupOfHosts(hosts)] : [];
  return [...(ofSurvey.length > 1 ? ofSurvey : []), ...all, ...single];
}

const groupOfHosts = (hosts: string[]): Group => ({
  value: 'hosts',
  label: `all ${hosts.length} hosts of detections`,
  name: `the ${hosts.length} hosts`,
  names: new Set(hosts),
});

function isSame(one: ReadonlySet<string>, other: ReadonlySet<string>): boolean {
  return one.size === other.size && [...one].every((name) => other.has(name));
}
