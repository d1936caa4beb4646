import { normalDensity } from '@/lib/numerics/normal';
import { ageNodes, ageQuantile } from '../age';
import { BUILT_IN_LAW_RANGE, builtInMagnitudes } from '../built-in-law';
import { ageRange, coolingName } from '../cooling';
import { tableLookup } from '../cooling-table';
import type { AgeLaw, CoolingRelation } from '../types';
import type { Estimate } from './axis-from-separation';

/** A companion's magnitude with the age of its star. */
export interface Photometry {
  band: string;
  absoluteMag: number;
  /** 1 σ, [mag], >= 0. */
  errorMag: number;
  age: AgeLaw;
}

export interface PhotometricMass {
  /** Masses at the median age whose magnitude is the measured one, increasing, [M_Jup]. */
  solutionsMjup: number[];
  /** Over the errors of magnitude and age; null where the median age has no solution. */
  interval: Estimate | null;
  /** Where there is no solution: on which side of the relation the magnitude lies. */
  outside: 'brighter' | 'fainter' | null;
  /** The interval reaches an end of the relation's masses. */
  touchesEdge: boolean;
}

/** No relation is better than this: smaller errors are raised to it (our rule). */
export const LEAST_MAGNITUDE_ERROR = 0.05;
const MASSES = 2000;
const NODES_PER_SIDE = 10;
/** Density at an end, against its peak, that makes the interval depend on where masses stop. */
const EDGE_SHARE = 0.01;

/**
 * Masses that a cooling relation allows for a measured magnitude, forward from mass to magnitude:
 * where brightness does not rise with mass, all of them.
 *
 * The interval is that of a prior flat in ln m over the relation's masses, times the normal law of
 * the magnitude's error (at least 0.05 mag), averaged over the law of the age.
 *
 * @param relation built-in law, or a table
 * @param photometry magnitude in a band of the relation, and the age
 * @throws RangeError for an unknown band, a magnitude that is not finite, an error < 0, or an age
 *   law that leaves the relation
 */
export function massFromPhotometry(
  relation: CoolingRelation,
  photometry: Photometry,
): PhotometricMass {
  const { absoluteMag, errorMag, age } = photometry;
  if (!Number.isFinite(absoluteMag)) {
    throw new RangeError(`absoluteMag must be finite, got ${absoluteMag}`);
  }
  if (!(errorMag >= 0)) throw new RangeError(`errorMag must be >= 0, got ${errorMag}`);
  const masses = scannedMasses(relation);
  const medianMyr = ageQuantile(age)(0.5);
  const nodes = ageNodes(age, 'smooth', NODES_PER_SIDE);
  requireCovered(relation, [medianMyr, ...nodes.values]);
  const atMedian = magnitudesAt(relation, photometry.band, masses, Float64Array.of(medianMyr));
  const solutionsMjup = crossings(masses, atMedian, absoluteMag);
  if (solutionsMjup.length === 0) {
    const outside = sideOf(atMedian, absoluteMag);
    return { solutionsMjup, interval: null, outside, touchesEdge: false };
  }
  const sigma = Math.max(LEAST_MAGNITUDE_ERROR, errorMag);
  const all = magnitudesAt(relation, photometry.band, masses, nodes.values);
  const ages = nodes.values.length;
  const density = Float64Array.from(masses, (_, i) => {
    let sum = 0;
    for (let k = 0; k < ages; k++) {
      const magnitude = all[i * ages + k];
      if (Number.isNaN(magnitude)) continue;
      sum += nodes.weights[k] * normalDensity((absoluteMag - magnitude) / sigma);
    }
    return sum;
  });
  return { solutionsMjup, outside: null, ...intervalOf(masses, density) };
}

function scannedMasses(relation: CoolingRelation): Float64Array {
  const { massMinMjup, massMaxMjup } = BUILT_IN_LAW_RANGE;
  const table = relation.kind === 'table' ? relation.table.massMjup : null;
  const low = table ? table[0] : massMinMjup;
  const high = table ? table[table.length - 1] : massMaxMjup;
  const step = Math.log(high / low) / (MASSES - 1);
  // The ends as they are tabulated: rounding must not step over them.
  return Float64Array.from({ length: MASSES }, (_, i) =>
    i === 0 ? low : i === MASSES - 1 ? high : low * Math.exp(i * step),
  );
}

function requireCovered(relation: CoolingRelation, agesMyr: number[]): void {
  const { range } = ageRange(relation);
  const lost = agesMyr.find((age) => !(age >= range[0] && age <= range[1]));
  if (lost === undefined) return;
  throw new RangeError(
    `the age must stay between ${range[0]} and ${range[1]} Myr for ${coolingName(relation)}, its law reaches ${Number(lost.toPrecision(3))} Myr`,
  );
}

/** Shape [mass, age]; NaN where a table has nothing. */
function magnitudesAt(
  relation: CoolingRelation,
  band: string,
  masses: Float64Array,
  agesMyr: Float64Array,
): Float64Array {
  if (relation.kind === 'built-in') return builtInMagnitudes(masses, agesMyr, band).magnitudes;
  const { magnitude } = tableLookup(relation.table, band);
  const ages = agesMyr.length;
  return Float64Array.from({ length: masses.length * ages }, (_, i) =>
    magnitude(masses[Math.floor(i / ages)], agesMyr[i % ages]),
  );
}

/** Places where the magnitude passes a value, linear in ln m between the scanned masses. */
function crossings(masses: Float64Array, magnitudes: Float64Array, value: number): number[] {
  const found: number[] = [];
  for (let i = 0; i + 1 < masses.length; i++) {
    const [left, right] = [magnitudes[i] - value, magnitudes[i + 1] - value];
    if (left === 0) found.push(masses[i]);
    else if (left * right < 0) {
      found.push(masses[i] * (masses[i + 1] / masses[i]) ** (left / (left - right)));
    }
  }
  if (magnitudes[masses.length - 1] === value) found.push(masses[masses.length - 1]);
  return found;
}

function sideOf(magnitudes: Float64Array, value: number): 'brighter' | 'fainter' | null {
  const known = magnitudes.filter((magnitude) => !Number.isNaN(magnitude));
  if (known.length === 0) return null;
  if (known.every((magnitude) => value < magnitude)) return 'brighter';
  return known.every((magnitude) => value > magnitude) ? 'fainter' : null;
}

function intervalOf(
  masses: Float64Array,
  density: Float64Array,
): Pick<PhotometricMass, 'interval' | 'touchesEdge'> {
  const cumulative = new Float64Array(masses.length);
  for (let i = 1; i < masses.length; i++) {
    cumulative[i] = cumulative[i - 1] + 0.5 * (density[i - 1] + density[i]);
  }
  const total = cumulative[masses.length - 1];
  if (!(total > 0)) return { interval: null, touchesEdge: false };
  const at = (p: number) => {
    const place = cumulative.findIndex((value) => value >= p * total);
    const i = Math.max(1, place);
    const step = cumulative[i] - cumulative[i - 1];
    const share = step > 0 ? (p * total - cumulative[i - 1]) / step : 0;
    return masses[i - 1] * (masses[i] / masses[i - 1]) ** share;
  };
  const peak = density.reduce((a, b) => Math.max(a, b), 0);
  const touchesEdge = Math.max(density[0], density[masses.length - 1]) > EDGE_SHARE * peak;
  return { interval: { median: at(0.5), lower: at(0.16), upper: at(0.84) }, touchesEdge };
}
