import type { DataTable } from './data-table';
import { valueAt } from './paths';

export interface NamedContrastCurve {
  name: string;
  /** Increasing [arcsec]. */
  separationArcsec: Float64Array;
  /** Fainter than the star by so many magnitudes, shape [separation]. */
  contrastMag: Float64Array;
}

/** Places along the separation at which curves are read. */
export const SAMPLES = 60;

export interface ContrastDomain {
  separation: [number, number];
  contrast: [number, number];
}

/** The ranges that hold every curve. */
export function contrastDomain(curves: NamedContrastCurve[]): ContrastDomain {
  const separations = curves.flatMap(({ separationArcsec: it }) => [it[0], it[it.length - 1]]);
  const contrasts = curves
    .flatMap(({ contrastMag }) => Array.from(contrastMag))
    .filter(Number.isFinite);
  if (separations.length === 0) return { separation: [0.1, 10], contrast: [0, 16] };
  const [low, high] = [Math.min(...separations), Math.max(...separations)];
  return {
    separation: [low / 1.08, high * 1.08],
    contrast: [Math.floor(Math.min(...contrasts)), Math.ceil(Math.max(...contrasts))],
  };
}

/** Evenly in the logarithm over the reach of all curves [arcsec]. */
export const sampleSeparations = ([from, to]: [number, number]) =>
  Float64Array.from(
    { length: SAMPLES },
    (_, index) => from * (to / from) ** (index / (SAMPLES - 1)),
  );

/** NaN beyond the ends of the curve. */
export function magAt(
  { separationArcsec: it, contrastMag }: NamedContrastCurve,
  arcsec: number,
): number {
  const reaches = it[0] <= arcsec && it[it.length - 1] >= arcsec;
  return reaches ? valueAt(it, contrastMag, arcsec) : Number.NaN;
}

/** Every point of every curve, for a file. */
export function contrastColumns(curves: NamedContrastCurve[]): DataTable {
  return {
    name: 'contrast-curves',
    columns: ['target', 'separation_arcsec', 'contrast_mag'],
    rows: curves.flatMap(({ name, separationArcsec, contrastMag }) =>
      Array.from(separationArcsec, (arcsec, i) => [name, arcsec, contrastMag[i]]),
    ),
  };
}
