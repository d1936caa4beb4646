import { addLongSlices, addSlices, clear, put, real, whole } from '../machine';

/** A factor below this moves no cell by more than 1e-12. */
const NEGLIGIBLE: f64 = 1e-14;
const SIXTH: f64 = 1 / 6;

// Where a star's rows lie: a row is made when something is first added to it.
let stride: i32 = 0;
let firstColumn: i32 = 0;
let slots: i32 = 0;
let free: i32 = 0;

/**
 * Begins the rows of a star.
 *
 * @param slotsAt where the place of every row is kept, 0 for one that has nothing yet
 * @param slotCount number of rows
 * @param freeAt where the rows are made, one after another
 * @param rowStride doubles of a row, a multiple of 8
 * @param column first column that can be reached at all, a multiple of 8
 */
export function openRows(
  slotsAt: i32,
  slotCount: i32,
  freeAt: i32,
  rowStride: i32,
  column: i32,
): void {
  slots = slotsAt;
  free = freeAt;
  stride = rowStride;
  firstColumn = column;
  clear(slotsAt, slotCount);
}

/** Place of a row that has something, or 0. */
export function rowAt(slot: i32): i32 {
  return whole(real(slots + slot));
}

function rowFor(slot: i32): i32 {
  const known = rowAt(slot);
  if (known > 0) return known;
  const row = free;
  free += stride;
  clear(row, stride);
  put(slots + slot, row);
  return row;
}

// The phases of an even axis, see SeparationPhases; a width of 0 stands for none.
let planes: i32 = 0;
let planeSize: i32 = 0;
let width: i32 = 0;
let phaseCount: i32 = 0;
let beyond: i32 = 0;
let phaseStep: f64 = 0;
let top: f64 = 0;
let firstLogAxis: f64 = 0;
let axisStep: f64 = 0;

/** Rows by slices of the phases. */
export function setPhases(
  planesAt: i32,
  doublesOfPlane: i32,
  columns: i32,
  phases: i32,
  columnsBeyond: i32,
  step: f64,
  largest: f64,
  logAxisBegins: f64,
  logAxisStep: f64,
): void {
  planes = planesAt;
  planeSize = doublesOfPlane;
  width = columns;
  phaseCount = phases;
  beyond = columnsBeyond;
  phaseStep = step;
  top = largest;
  firstLogAxis = logAxisBegins;
  axisStep = logAxisStep;
}

// The table of a law and the axis, for an axis that is not even.
let table: i32 = 0;
let intervals: i32 = 0;
let tableStart: f64 = 0;
let tableStep: f64 = 0;
let logAxis: i32 = 0;
let columnCount: i32 = 0;

/** Rows column by column: F, G and G2 lie one after another, see SeparationTable. */
export function setTable(
  tableAt: i32,
  tableIntervals: i32,
  start: f64,
  step: f64,
  logAxisAt: i32,
  columns: i32,
): void {
  width = 0;
  table = tableAt;
  intervals = tableIntervals;
  tableStart = start;
  tableStep = step;
  logAxis = logAxisAt;
  columnCount = columns;
}

/**
 * Adds perF · F + perG · G + perG2 · G2 at a projected separation e^y au to a row.
 *
 * @param y ln of the projected separation, [ln au]
 * @param perF factor of F, the distribution function
 * @param perG factor of its first antiderivative
 * @param perG2 factor of its second
 */
export function addRow(y: f64, perF: f64, perG: f64, perG2: f64, slot: i32): void {
  const isLong = Math.abs(perG2) >= NEGLIGIBLE;
  if (!isLong && Math.abs(perF) < NEGLIGIBLE && Math.abs(perG) < NEGLIGIBLE) return;
  if (width === 0) {
    addColumns(y, perF, perG, perG2, rowFor(slot));
    return;
  }
  const place: f64 = (top - y + firstLogAxis) / phaseStep;
  const below: f64 = Math.floor(place);
  const node = whole(below);
  const phase = ((node % phaseCount) + phaseCount) % phaseCount;
  const column = (node - phase) / phaseCount + beyond + firstColumn;
  if (column >= width - stride - 1) return;
  const row = rowFor(slot) + firstColumn;
  if (column < 0) {
    addBeyond(y, perF, perG, perG2, row);
    return;
  }
  const t: f64 = place - below;
  const down: f64 = t * phaseStep;
  const slice = planes + phase * width + column;
  const drop: f64 = -t * perF + 0.5 * t * down * perG;
  const own: f64 = perF - down * perG;
  if (isLong) {
    addLongSlices(
      row,
      slice,
      planeSize,
      drop - (t * down * down * perG2) / 6,
      own + 0.5 * down * down * perG2,
      perG - down * perG2,
      perG2,
      stride - firstColumn,
    );
  } else {
    addSlices(row, slice, planeSize, drop, own, perG, stride - firstColumn);
  }
}

/** Separations beyond every column of the phases: F is 1 and the others go on from their ends. */
function addBeyond(y: f64, perF: f64, perG: f64, perG2: f64, row: i32): void {
  const lastG = real(planes + 2 * planeSize + beyond);
  const lastG2 = real(planes + 3 * planeSize + beyond);
  for (let j: i32 = 0; j < stride - firstColumn; j++) {
    const past: f64 = y - firstLogAxis - (firstColumn + j) * axisStep - top;
    const second: f64 = lastG2 + past * (lastG + 0.5 * past);
    put(row + j, real(row + j) + (perF + perG * (lastG + past) + perG2 * second));
  }
}

function addColumns(y: f64, perF: f64, perG: f64, perG2: f64, row: i32): void {
  const size = intervals + 1;
  const perStep: f64 = 1 / tableStep;
  const shift: f64 = y - tableStart;
  const firstEnd = real(table + size + intervals);
  const secondEnd = real(table + 2 * size + intervals);
  for (let j: i32 = 0; j < columnCount; j++) {
    const place: f64 = (shift - real(logAxis + j)) * perStep;
    if (place <= 0) continue;
    let value: f64 = 1;
    let area: f64 = 0;
    let second: f64 = 0;
    if (place >= intervals) {
      const past: f64 = (place - intervals) * tableStep;
      area = firstEnd + past;
      second = secondEnd + past * (firstEnd + 0.5 * past);
    } else {
      const i = whole(place);
      const share: f64 = place - i;
      const t: f64 = share * tableStep;
      const low = real(table + i);
      const rise: f64 = (real(table + i + 1) - low) * share;
      const lowArea = real(table + size + i);
      value = low + rise;
      area = lowArea + t * (low + 0.5 * rise);
      second = real(table + 2 * size + i) + t * (lowArea + t * (0.5 * low + rise * SIXTH));
    }
    put(row + j, real(row + j) + (perF * value + perG * area + perG2 * second));
  }
}
