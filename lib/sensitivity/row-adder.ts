import type { Kernels } from './kernels/kernels';
import type { SeparationPhases } from './separation-phases';
import { type FillRow, newRow } from './separation-rows';

/**
 * Adds perF · F + perG · G + perG2 · G2 at a projected separation e^y au to one row, and takes it
 * from another.
 *
 * @param y ln of the projected separation, [ln au]
 * @param perF factor of F, the distribution function
 * @param perG factor of its first antiderivative
 * @param perG2 factor of its second
 * @param target row to add to
 * @param source row to take from; -1 for none
 */
export type AddRow = (
  y: number,
  perF: number,
  perG: number,
  perG2: number,
  target: number,
  source: number,
) => void;

/** Where the rows lie in the kernels' memory, in doubles. */
export interface RowPlaces {
  rows: number;
  stride: number;
  /** First column that can be reached at all; those before it stay 0. */
  firstColumn: number;
  /** A row that nobody reads, to take from where no other is named. */
  spare: number;
}

/** A factor below this moves no cell by more than 1e-12. */
const NEGLIGIBLE = 1e-14;

/**
 * Rows by slices of the phases, whose planes begin at `table` in the kernels' memory.
 *
 * @throws never; a row beyond the table is worked out column by column
 */
export function phaseRows(
  kernels: Kernels,
  phases: SeparationPhases,
  table: number,
  { rows, stride, firstColumn, spare }: RowPlaces,
): AddRow {
  const { firstLogAxis, axisStep, phases: count, step, top, beyond, width, planeSize } = phases;
  const width0 = stride - firstColumn;
  const zeroAt = width - stride - 1;
  const [lastG, lastG2] = [2, 3].map((plane) => phases.planes[plane * planeSize + beyond]);
  const memory = kernels.reserve(0);
  return (y, perF, perG, perG2, target, source) => {
    const place = (top - y + firstLogAxis) / step;
    const node = Math.floor(place);
    const phase = ((node % count) + count) % count;
    const column = (node - phase) / count + beyond + firstColumn;
    if (column >= zeroAt) return;
    const to = rows + target * stride + firstColumn;
    const from = rows + (source < 0 ? spare : source) * stride + firstColumn;
    if (column < 0) {
      for (let j = 0; j < width0; j++) {
        const past = y - firstLogAxis - (firstColumn + j) * axisStep - top;
        const second = lastG2 + past * (lastG + 0.5 * past);
        const value = perF + perG * (lastG + past) + perG2 * second;
        memory[to + j] += value;
        memory[from + j] -= value;
      }
      return;
    }
    const t = place - node;
    const down = t * step;
    const slice = table + phase * width + column;
    const drop = -t * perF + 0.5 * t * down * perG;
    const own = perF - down * perG;
    if (Math.abs(perG2) < NEGLIGIBLE) {
      if (Math.abs(perF) < NEGLIGIBLE && Math.abs(perG) < NEGLIGIBLE) return;
      kernels.addRow(to, from, slice, planeSize, drop, own, perG, width0);
      return;
    }
    kernels.addLongRow(
      to,
      from,
      slice,
      planeSize,
      drop - (t * down * down * perG2) / 6,
      own + 0.5 * down * down * perG2,
      perG - down * perG2,
      perG2,
      width0,
    );
  };
}

/**
 * Rows column by column, for axes that are not even in ln a.
 *
 * @param fill rows of the law
 * @param columns number of semi-major axes
 */
export function lookedUpRows(
  kernels: Kernels,
  fill: FillRow,
  columns: number,
  { rows, stride, spare }: RowPlaces,
): AddRow {
  const row = newRow(columns);
  const memory = kernels.reserve(0);
  return (y, perF, perG, perG2, target, source) => {
    const isNothing = perF === 0 && Math.abs(perG) < NEGLIGIBLE && Math.abs(perG2) < NEGLIGIBLE;
    if (isNothing) return;
    fill(y, row);
    const to = rows + target * stride;
    const from = rows + (source < 0 ? spare : source) * stride;
    for (let j = 0; j < columns; j++) {
      const value = perF * row.cumulative[j] + perG * row.first[j] + perG2 * row.second[j];
      memory[to + j] += value;
      memory[from + j] -= value;
    }
  };
}
