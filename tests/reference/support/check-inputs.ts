import { intervalIndex } from '@/lib/numerics/grid';
import type {
  ContrastCurve,
  EccentricityLaw,
  SensitivitySettings,
  StarInputs,
} from '@/lib/sensitivity';

export type LawInputs =
  | { law: 'circular' }
  | { law: 'fixed'; e: number }
  | { law: 'uniform'; max: number }
  | { law: 'beta'; a: number; b: number }
  | { law: 'rayleigh'; sigma: number };

export interface CurveInputs {
  separation_arcsec: number[];
  contrast_mag: number[];
  coverage?: { separation_arcsec: number[]; fraction: number[] };
}

export interface StarCheckInputs {
  name: string;
  band: string;
  magnitude: number;
  distance_pc: number;
  distance_error_pc: number;
  age_myr: number;
  age_lo_myr: number;
  age_hi_myr: number;
}

/** An eccentricity law as the check files write it. */
export function eccentricityLaw(inputs: LawInputs): EccentricityLaw {
  if (inputs.law === 'fixed') return { law: 'fixed', eccentricity: inputs.e };
  if (inputs.law === 'beta') return { law: 'beta', alpha: inputs.a, beta: inputs.b };
  return inputs;
}

/**
 * A curve as the check files write it: coverage may have points of its own, so both are put on the
 * union of the points, which changes neither because both are linear in ln θ.
 */
export function contrastCurve(
  inputs: CurveInputs,
  band: string,
  nSigma: number,
  offsetMag = 0,
): ContrastCurve {
  const { separation_arcsec, contrast_mag, coverage } = inputs;
  const first = separation_arcsec[0];
  const last = separation_arcsec[separation_arcsec.length - 1];
  const own = (coverage?.separation_arcsec ?? []).filter((x) => x >= first && x <= last);
  const places = [...new Set([...separation_arcsec, ...own])].sort((a, b) => a - b);
  const curve: ContrastCurve = {
    separationArcsec: Float64Array.from(places),
    contrastMag: Float64Array.from(
      places.map((x) => logLinear(x, separation_arcsec, contrast_mag) + offsetMag),
    ),
    nSigma,
    band,
  };
  if (coverage) {
    curve.coverage = Float64Array.from(
      places.map((x) => logLinear(x, coverage.separation_arcsec, coverage.fraction)),
    );
  }
  return curve;
}

function logLinear(x: number, xs: number[], ys: number[]): number {
  const i = intervalIndex(xs, x);
  const share = Math.log(x / xs[i]) / Math.log(xs[i + 1] / xs[i]);
  return ys[i] + (ys[i + 1] - ys[i]) * share;
}

/** A star as the check files write it; without errors when `isExact`. */
export function starInputs(
  inputs: StarCheckInputs,
  curves: ContrastCurve[],
  isExact: boolean,
): StarInputs {
  return {
    name: inputs.name,
    hostMag: inputs.magnitude,
    age: isExact
      ? { medianMyr: inputs.age_myr }
      : {
          medianMyr: inputs.age_myr,
          lowerMyr: inputs.age_lo_myr,
          upperMyr: inputs.age_hi_myr,
        },
    distance: {
      distancePc: inputs.distance_pc,
      errorPc: isExact ? 0 : inputs.distance_error_pc,
    },
    curves,
  };
}

export function sensitivitySettings(
  law: LawInputs,
  threshold: SensitivitySettings['threshold'],
  ageNodesPerSide?: number,
): SensitivitySettings {
  return {
    eccentricity: eccentricityLaw(law),
    threshold,
    massOutsideTable: 'undetectable',
    ageOutsideTable: 'refuse',
    ...(ageNodesPerSide ? { ageNodesPerSide } : {}),
  };
}
