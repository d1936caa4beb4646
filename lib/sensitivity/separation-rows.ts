import { singleEccentricity } from './eccentricity';
import { circularSeparationCumulative } from './orbits';
import { separationTable } from './separation-table';
import type { EccentricityLaw } from './types';

const SIXTH = 1 / 6;

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
  const [firstEnd, secondEnd] = [first[last], second[last]];
  const columns = logAxis.length;
  return (logSeparationAu, row) => {
    const { cumulative: rowF, first: rowG, second: rowH } = row;
    const shift = logSeparationAu - start;
    for (let j = 0; j < columns; j++) {
      const place = (shift - logAxis[j]) * perStep;
      if (place <= 0) {
        rowF[j] = 0;
        rowG[j] = 0;
        rowH[j] = 0;
      } else if (place >= last) {
        const beyond = (place - last) * step;
        rowF[j] = 1;
        rowG[j] = firstEnd + beyond;
        rowH[j] = secondEnd + beyond * (firstEnd + 0.5 * beyond);
      } else {
        const i = place | 0;
        const t = (place - i) * step;
        const value = cumulative[i];
        const rise = (cumulative[i + 1] - value) * (place - i);
        const area = first[i];
        rowF[j] = value + rise;
        rowG[j] = area + t * (value + 0.5 * rise);
        rowH[j] = second[i] + t * (area + t * (0.5 * value + rise * SIXTH));
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
