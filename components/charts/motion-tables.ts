import { formatSignificant } from '@/lib/quantities/display';
import type { ChartTable } from './chart-figure';
import type { DataTable } from './data-table';

export interface MotionPlace {
  eastArcsec: number;
  northArcsec: number;
}

/** One epoch: where the source was, and where it would have been as a background source. */
export interface MotionEpoch extends MotionPlace {
  id: string;
  date: string;
  isReference: boolean;
  /** 1 σ; null where none is known. */
  errorEastArcsec: number | null;
  errorNorthArcsec: number | null;
  background: MotionPlace | null;
  /** Distance from each hypothesis in σ; null where it was not tested. */
  sigmaCommon: number | null;
  sigmaBackground: number | null;
}

/** Epochs for files, unrounded. */
export function motionColumns(epochs: MotionEpoch[]): DataTable {
  return {
    name: 'epochs',
    columns: [
      'date',
      'east_arcsec',
      'east_error_arcsec',
      'north_arcsec',
      'north_error_arcsec',
      'background_east_arcsec',
      'background_north_arcsec',
      'sigma_common_motion',
      'sigma_background',
    ],
    rows: epochs.map((epoch) => [
      epoch.date,
      epoch.eastArcsec,
      epoch.errorEastArcsec,
      epoch.northArcsec,
      epoch.errorNorthArcsec,
      epoch.background?.eastArcsec ?? null,
      epoch.background?.northArcsec ?? null,
      epoch.sigmaCommon,
      epoch.sigmaBackground,
    ]),
  };
}

/** The same to be read. */
export function motionTable(name: string, epochs: MotionEpoch[]): ChartTable {
  const at = (value: number | null | undefined) =>
    value === null || value === undefined ? '–' : value.toFixed(4);
  const sigma = (value: number | null, epoch: MotionEpoch) =>
    epoch.isReference ? 'reference' : value === null ? '–' : formatSignificant(value, 3);
  return {
    caption: `Measured offsets of ${name} and those of a source at rest behind its star, arcsec`,
    columns: [
      'epoch',
      'east',
      'error',
      'north',
      'error of north',
      'east, background',
      'north, background',
      'σ from common motion',
      'σ from background',
    ],
    rows: epochs.map((epoch) => [
      epoch.date,
      at(epoch.eastArcsec),
      at(epoch.errorEastArcsec),
      at(epoch.northArcsec),
      at(epoch.errorNorthArcsec),
      at(epoch.background?.eastArcsec),
      at(epoch.background?.northArcsec),
      sigma(epoch.sigmaCommon, epoch),
      sigma(epoch.sigmaBackground, epoch),
    ]),
  };
}
