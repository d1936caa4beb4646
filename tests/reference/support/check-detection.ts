import type { MeasuredDetection } from '@/lib/inference';

/** A detection as the check files write it: errors in natural logarithm, the same on both sides. */
export interface DetectionInputs {
  star?: string;
  mass_mjup: number;
  axis_au: number;
  sigma_ln_mass: number;
  sigma_ln_axis: number;
}

/** @param starNames names in the order of the maps */
export function measuredDetection(
  inputs: DetectionInputs,
  starNames: readonly string[] = [],
): MeasuredDetection {
  const { mass_mjup: mass, axis_au: axis, sigma_ln_mass, sigma_ln_axis, star } = inputs;
  const measured = (value: number, sigma: number) => ({
    value,
    lower: value * Math.exp(-sigma),
    upper: value * Math.exp(sigma),
  });
  return {
    star: star === undefined ? 0 : starNames.indexOf(star),
    name: star ?? 'detection',
    massMjup: mass,
    semiMajorAxisAu: axis,
    measurement: {
      kind: 'values',
      mass: measured(mass, sigma_ln_mass),
      semiMajorAxis: measured(axis, sigma_ln_axis),
    },
  };
}
