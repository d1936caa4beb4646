import type { AxisShape, Population } from '@/lib/population';

/** A law along one axis as the check files write it. */
type AxisInputs =
  | { kind: 'power'; p: { index: number } }
  | { kind: 'lognormal'; p: { median: number; sigma_ln: number } }
  | { kind: 'broken'; p: { break: number; inner_index: number; outer_index: number } };

export interface PopulationInputs {
  mass: AxisInputs;
  axis: AxisInputs;
  mass_range_mjup: [number, number];
  axis_range_au: [number, number];
}

function axisShape(inputs: AxisInputs): AxisShape {
  switch (inputs.kind) {
    case 'power':
      return { shape: 'power-law', index: inputs.p.index };
    case 'lognormal':
      return {
        shape: 'log-normal',
        median: inputs.p.median,
        sigmaDex: inputs.p.sigma_ln / Math.LN10,
      };
    case 'broken':
      return {
        shape: 'broken-power-law',
        breakAt: inputs.p.break,
        innerIndex: inputs.p.inner_index,
        outerIndex: inputs.p.outer_index,
      };
  }
}

/** A population as the check files write it: power laws in their own form, others as shapes. */
export function checkedPopulation(inputs: PopulationInputs): Population {
  const box = {
    massMinMjup: inputs.mass_range_mjup[0],
    massMaxMjup: inputs.mass_range_mjup[1],
    semiMajorAxisMinAu: inputs.axis_range_au[0],
    semiMajorAxisMaxAu: inputs.axis_range_au[1],
  };
  const { mass, axis } = inputs;
  if (mass.kind === 'power' && axis.kind === 'power') {
    return {
      form: 'power-law',
      ...box,
      massIndex: mass.p.index,
      semiMajorAxisIndex: axis.p.index,
    };
  }
  return { form: 'shaped', ...box, mass: axisShape(mass), semiMajorAxis: axisShape(axis) };
}
