import type { ReactNode } from 'react';
import { JupiterMassText } from '@/components/charts/axes';
import type { FieldAxis } from '@/components/charts/limit-field-chart';
import { formatIndex } from '@/components/populations/law-notation';
import { quotedSweepValue, type SweptParameter, sweptParameters } from '@/lib/inference';
import { formatPlain } from '@/lib/quantities/display';
import type { DrawnInputs } from '@/lib/schemas/runs';
import type { AskedRun } from '../kind-entry';

const symbols: Partial<Record<SweptParameter, ReactNode>> = {
  'mass-index': (
    <>
      mass index <tspan fontStyle="italic">α</tspan>, per d<tspan fontStyle="italic">M</tspan>
    </>
  ),
  'semi-major-axis-index': (
    <>
      semi-major-axis index <tspan fontStyle="italic">β</tspan>, per d
      <tspan fontStyle="italic">a</tspan>
    </>
  ),
};

/** The axis of a sweep, at stored values, as it is quoted. */
export function sweepAxis(over: SweptParameter, stored: number[]): FieldAxis {
  const { name, unit } = sweptParameters[over];
  if (unit === 'index') {
    return {
      at: stored.map((value) => quotedSweepValue(over, value)),
      isLog: false,
      name: symbols[over] ?? name,
      plainName: name,
      say: (value) => `${name === 'mass index' ? 'α' : 'β'} = ${formatIndex(value)}`,
    };
  }
  return {
    at: stored,
    isLog: true,
    name:
      unit === 'AU' ? (
        `${name}, AU`
      ) : (
        <>
          {name}, <JupiterMassText />
        </>
      ),
    plainName: name,
    say: (value) => `${formatPlain(value, 3)} ${unit === 'AU' ? 'AU' : 'Jupiter masses'}`,
  };
}

/** The value that the run itself used, as stored; undefined for a population without it. */
export function ownValue(over: SweptParameter, { definition }: AskedRun): number | undefined {
  if (definition?.form !== 'power-law') return undefined;
  switch (over) {
    case 'semi-major-axis-max':
      return definition.semiMajorAxisMaxAu;
    case 'semi-major-axis-min':
      return definition.semiMajorAxisMinAu;
    case 'mass-min':
      return definition.massMinMjup;
    case 'mass-max':
      return definition.massMaxMjup;
    case 'mass-index':
      return definition.massIndex;
    case 'semi-major-axis-index':
      return definition.semiMajorAxisIndex;
    case 'both-indices':
      return undefined;
  }
}

/** Where the companions of the run lie along a range; none along an index. */
export function companionPlaces(over: SweptParameter, { inputs }: AskedRun): number[] {
  switch (sweptParameters[over].unit) {
    case 'AU':
      return inputs.companions.map(({ semiMajorAxisAu }) => semiMajorAxisAu);
    case 'MJ':
      return inputs.companions.map(({ massMjup }) => massMjup);
    case 'index':
      return [];
  }
}

/** A span worth asking for: the grid on one side, the other end of the run's range on the other. */
export function usualSpan(over: SweptParameter, asked: AskedRun): { from: number; to: number } {
  const { massMjup, semiMajorAxisAu } = asked.inputs.grid as DrawnInputs['grid'];
  const last = (nodes: number[]) => nodes[nodes.length - 1];
  const round = (value: number) => Number(value.toPrecision(2));
  const { definition } = asked;
  const box = definition?.form === 'power-law' ? definition : undefined;
  switch (over) {
    case 'semi-major-axis-max':
      return {
        from: round((box?.semiMajorAxisMinAu ?? semiMajorAxisAu[0]) * 1.5),
        to: round(last(semiMajorAxisAu)),
      };
    case 'semi-major-axis-min':
      return {
        from: round(semiMajorAxisAu[0]),
        to: round((box?.semiMajorAxisMaxAu ?? last(semiMajorAxisAu)) / 1.5),
      };
    case 'mass-max':
      return { from: round((box?.massMinMjup ?? massMjup[0]) * 1.5), to: round(last(massMjup)) };
    case 'mass-min':
      return { from: round(massMjup[0]), to: round((box?.massMaxMjup ?? last(massMjup)) / 1.5) };
    default:
      return { from: -2, to: 1 };
  }
}
