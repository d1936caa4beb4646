'use client';

import { TRACK } from '@/components/runs/tracks';
import { fromLogIndex, toLogIndex } from '@/lib/population';
import type { LawPartProps } from './law-part-props';
import { definitionOf, type LawParameter, readParameter, withParameter } from './law-parts';
import { ParameterSlider } from './parameter-slider';

interface NumberField {
  field: Exclude<LawParameter['field'], 'breakAt' | 'median'>;
  /** Before the letter: "index", "below the break". */
  words: string;
}

const numbers: Record<string, NumberField[]> = {
  'power-law': [{ field: 'index', words: 'index' }],
  'broken-power-law': [
    { field: 'innerIndex', words: 'below the break' },
    { field: 'outerIndex', words: 'above the break' },
  ],
  'log-normal': [{ field: 'sigmaDex', words: 'spread, dex' }],
  tabulated: [],
};

const tracks = { mass: TRACK.massIndex, semiMajorAxis: TRACK.semiMajorAxisIndex };
const SPREAD_TRACK = [0.05, 1.5] as const;
const SPREAD_TICKS = [0.05, 0.5, 1, 1.5];
const same = (value: number) => value;
/** What a conversion leaves in the last bits must not move an end by a tenth. */
const tenthBelow = (value: number) => Math.floor(10 * value + 1e-6) / 10;
const tenthAbove = (value: number) => Math.ceil(10 * value - 1e-6) / 10;

/** Sliders of the numbers that a form has beside its place on the axis. */
export function ShapeNumbers(props: LawPartProps) {
  const { axis, setting, settled, parts, saved, sample, onSetting } = props;
  const convention = setting.conventions[axis];
  const { shape } = parts[axis];
  const name = axis === 'mass' ? (parts.isRatio ? 'Mass-ratio' : 'Mass') : 'Semi-major-axis';
  return numbers[shape.shape].map(({ field, words }) => {
    const parameter: LawParameter = { part: axis, field };
    const value = readParameter(parts, parameter);
    if (value === undefined) return null;
    const isSpread = field === 'sigmaDex';
    const symbol = isSpread ? 'σ' : axis === 'mass' ? 'α' : 'β';
    const shown = (linear: number) => fromLogIndex(toLogIndex(linear, 'linear'), convention);
    const [from, to] = tracks[axis];
    return (
      <ParameterSlider
        key={field}
        name={`${name} ${isSpread ? 'spread' : field === 'index' ? 'index' : `index ${words}`}`}
        symbol={symbol}
        label={
          <>
            {words} <i>{symbol}</i>
          </>
        }
        parameter={parameter}
        settled={settled}
        sample={sample}
        value={value}
        savedValue={saved && readParameter(saved, parameter)}
        track={isSpread ? SPREAD_TRACK : [tenthBelow(shown(from)), tenthAbove(shown(to))]}
        ticks={isSpread ? SPREAD_TICKS : undefined}
        step={isSpread ? 0.01 : 0.05}
        toShown={isSpread ? same : (index) => fromLogIndex(index, convention)}
        fromShown={isSpread ? same : (index) => toLogIndex(index, convention)}
        onChange={(next, isSettled) =>
          onSetting(
            { ...setting, definition: definitionOf(withParameter(parts, parameter, next)) },
            isSettled,
          )
        }
      />
    );
  });
}
