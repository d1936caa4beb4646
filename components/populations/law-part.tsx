'use client';

import { RangeControl } from '@/components/charts/range-control';
import { EditableRange } from '@/components/runs/editable-range';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import type { AxisConvention, AxisShape } from '@/lib/population';
import { formatPlain } from '@/lib/quantities/display';
import { BuilderPart } from './builder-part';
import { ConventionChoice } from './convention-choice';
import type { LawPartProps } from './law-part-props';
import {
  type AxisForm,
  axisFormOf,
  definitionOf,
  type LawAxis,
  type LawParts,
  withForm,
} from './law-parts';
import { OwnDistribution } from './own-distribution';
import { ShapeDrawing } from './shape-drawing';
import { ShapeNumbers } from './shape-numbers';
import { axisNotation, RangeWords, ShapeWords, WithUnit } from './shape-words';

const forms: Record<LawAxis, { value: AxisForm; label: string }[]> = {
  mass: [
    { value: 'power-law', label: 'power law' },
    { value: 'broken-power-law', label: 'broken' },
    { value: 'log-normal', label: 'log-normal' },
    { value: 'tabulated', label: 'table' },
    { value: 'mass-ratio', label: 'mass ratio' },
  ],
  semiMajorAxis: [
    { value: 'power-law', label: 'power law' },
    { value: 'broken-power-law', label: 'broken' },
    { value: 'log-normal', label: 'log-normal' },
    { value: 'tabulated', label: 'table' },
  ],
};

const titles = { mass: 'Planet mass', semiMajorAxis: 'Semi-major axis' } as const;
/** What a typed range may hold; the maps may end before. */
const typed = { MJ: [0.01, 1000], AU: [0.01, 100_000], '': [0.00001, 1] } as const;
/** The track of a mass ratio, which the maps do not know. */
const RATIO_TRACK: [number, number] = [0.0001, 0.1];

/** One axis of a population: its form, its numbers with the drawn law, and its hard range. */
export function LawPart(props: LawPartProps) {
  const { number, axis, setting, parts, nodes, profile, onSetting } = props;
  const { range, shape } = parts[axis];
  const isRatio = axis === 'mass' && parts.isRatio;
  const { symbol, unit, unitWords } = axisNotation(axis, isRatio);
  const title = titles[axis];
  const name = isRatio ? 'Mass ratio' : title;
  const convention = setting.conventions[axis];
  const change = (next: LawParts, isSettled: boolean) =>
    onSetting({ ...setting, definition: definitionOf(next) }, isSettled);
  const changePart = (part: Partial<LawParts[LawAxis]>, isSettled: boolean) =>
    change({ ...parts, [axis]: { ...parts[axis], ...part } }, isSettled);
  const track = isRatio ? RATIO_TRACK : [endOf(nodes[0]), endOf(nodes[nodes.length - 1])];
  const bounds: [number, number] = [Math.min(track[0], range[0]), Math.max(track[1], range[1])];
  const placeField = { 'broken-power-law': 'breakAt', 'log-normal': 'median' } as const;
  const hasPlace = shape.shape === 'broken-power-law' || shape.shape === 'log-normal';
  const place = placeOf(shape);
  // One number and the range share a row; the drawing then has the next one to itself.
  const isAlone = shape.shape === 'power-law' || shape.shape === 'log-normal';

  return (
    <BuilderPart number={number} title={title}>
      <ConsequenceSwitch<AxisForm>
        label={`Form of the law of ${name.toLowerCase()}`}
        isLabelHidden
        isWide
        size="small"
        value={axisFormOf(parts, axis)}
        options={forms[axis]}
        onChange={(form) => change(withForm(parts, axis, form), true)}
      />
      <p className="mt-2.5 mb-2 text-note">
        <ShapeWords axis={axis} isRatio={isRatio} shape={shape} convention={convention} />
      </p>
      {(shape.shape === 'power-law' || shape.shape === 'broken-power-law') && (
        <ConventionChoice
          axis={axis}
          symbol={symbol}
          shape={shape}
          convention={convention}
          onChange={(next: AxisConvention) =>
            onSetting({ ...setting, conventions: { ...setting.conventions, [axis]: next } }, true)
          }
        />
      )}
      <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
        <ShapeNumbers {...props} />
        {shape.shape === 'tabulated' && (
          <div className="sm:col-span-2">
            <OwnDistribution
              name={name}
              place={unit === '' ? symbol : `${symbol} in ${unit}`}
              perLog={`ln ${symbol}`}
              shape={shape}
              onShape={(next) => changePart({ shape: next }, true)}
            />
          </div>
        )}
        <div className={`min-w-0 ${isAlone ? 'order-last sm:col-span-2' : ''}`}>
          <ShapeDrawing
            name={name}
            label={hasPlace ? placeNames[shape.shape] : 'drawn, per logarithm'}
            valueLabel={
              place !== undefined && <WithUnit unit={unit}>{formatPlain(place)}</WithUnit>
            }
            shape={shape}
            range={range}
            bounds={bounds}
            place={
              hasPlace && place !== undefined
                ? {
                    name: placeNames[shape.shape],
                    value: place,
                    savedValue: props.saved && placeOf(props.saved[axis].shape),
                    valueText: `${formatPlain(place)} ${unitWords}`,
                    onChange: (value, isSettled) =>
                      changePart(
                        { shape: { ...shape, [placeField[shape.shape]]: value } as AxisShape },
                        isSettled,
                      ),
                  }
                : undefined
            }
          />
        </div>
        <RangeControl
          name={name}
          label="range"
          valueLabel={
            <EditableRange
              name={name.toLowerCase()}
              unit={unitWords}
              mark={<WithUnit unit={unit}>{null}</WithUnit>}
              min={range[0]}
              max={range[1]}
              bounds={[...typed[unit as keyof typeof typed]]}
              onChange={(min, max) => changePart({ range: [min, max] }, true)}
            >
              <RangeWords axis={axis} parts={parts} />
            </EditableRange>
          }
          unitWords={unitWords}
          value={range}
          bounds={bounds}
          onChange={(next, isSettled) => changePart({ range: next }, isSettled)}
          profile={profile && !isRatio ? { at: nodes, height: profile } : undefined}
        />
      </div>
    </BuilderPart>
  );
}

/** Server and browser differ in the last bit of a power: what both draw must not show it. */
const endOf = (node: number) => Number(node.toPrecision(9));

const placeNames = { 'broken-power-law': 'break', 'log-normal': 'median' } as const;

function placeOf(shape: AxisShape): number | undefined {
  if (shape.shape === 'broken-power-law') return shape.breakAt;
  return shape.shape === 'log-normal' ? shape.median : undefined;
}
