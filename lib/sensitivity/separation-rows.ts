import { singleEccentricity } from './eccentricity';
import { circularSeparationCumulative } from './orbits';
import { separationTable } from './separation-table';
import type { EccentricityLaw } from './types';

/** F and its antiderivatives at one projected separation, for every semi-major axis of a grid. */
export interface SeparationRow {
  /** P(projected separation < s | a), shape [semiMajorAxis]. */
  cumulative: Float64Array;
  /** ∫ F d ln s, same shape. */
  first: Float64Array;
  /** ∫∫ F, same shape. */
  second: Float64Array;
}

/** Fills a row for a projected separation given as ln s, s in au. */
export type FillRow = (logSeparationAu: number, row: SeparationRow) => void;

export function newRow(columns: number): SeparationRow {
  return {
    cumulative: new Float64Array(columns),
    first: new Float64Array(columns),
    second: new Float64Array(columns),
  };
}

/**
 * Rows from the law's table, with both antiderivatives.
 *
 * @param law eccentricity law
 * @param logAxis ln a of the grid, [ln au], not modified
 * @throws RangeError for parameters outside their domain
 */
export function tabulatedRows(law: EccentricityLaw, logAxis: Float64Array): FillRow {
  const { start, step, cumulative, first, second } = separationTable(law);
  const last = cumulative.length - 1;
  const perStep = 1 / step;
  return (logSeparationAu, row) => {
    for (let j = 0; j < logAxis.length; j++) {
      const place = (logSeparationAu - logAxis[j] - start) * perStep;
      if (place <= 0) {
        row.cumulative[j] = 0;
        row.first[j] = 0;
        row.second[j] = 0;
      } else if (place >= last) {
        const beyond = (place - last) * step;
        row.cumulative[j] = 1;
        row.first[j] = first[last] + beyond;
        row.second[j] = second[last] + beyond * (first[last] + 0.5 * beyond);
      } else {
        const i = place | 0;
        const t = (place - i) * step;
        const value = cumulative[i];
        const rise = (cumulative[i + 1] - value) * perStep * t;
        row.cumulative[j] = value + rise;
        row.first[j] = first[i] + t * (value + 0.5 * rise);
        row.second[j] = second[i] + t * (first[i] + t * (0.5 * value + rise / 6));
      }
    }
  };
}

/**
 * Rows of F and its first antiderivative, exact for circular orbits, whose density is infinite at
 * ρ = 1 so that no table follows it. The second antiderivative is left alone.
 *
 * @param law eccentricity law
 * @param logAxis ln a of the grid, [ln au], not modified
 * @throws RangeError for parameters outside their domain
 */
export function exactRows(law: EccentricityLaw, logAxis: Float64Array): FillRow {
  if (singleEccentricity(law) !== 0) return tabulatedRows(law, logAxis);
  const axis = logAxis.map(Math.exp);
  const atOne = 1 - Math.LN2;
  return (logSeparationAu, row) => {
    const separation = Math.exp(logSeparationAu);
    for (let j = 0; j < axis.length; j++) {
      const x = separation / axis[j];
      row.cumulative[j] = circularSeparationCumulative(x);
      // ∫ (1 - √(1-x²)) d ln x = ln(1 + w) - w + 1 - ln 2, w = √(1-x²), from 0.
      const w = x < 1 ? Math.sqrt((1 - x) * (1 + x)) : 0;
      row.first[j] = x < 1 ? Math.log1p(w) - w + atOne : atOne + logSeparationAu - logAxis[j];
    }
  };
}
