import { isSameAxis } from '@/lib/numerics/grid';
import { cellRange } from './cell-range';
import { cellOfZero } from './cooling-paths';
import { compiledKernels } from './kernels/compiled';
import type { Kernels } from './kernels/kernels';
import { plainKernels } from './kernels/plain';
import { newShelf, type Shelved } from './kernels/shelf';
import {
  fillMagnitudeWeights,
  type WeightInputs,
  weightScratch,
  weightTables,
} from './magnitude-weights';
import { largestSeparation } from './orbits';
import { evenStep, type SeparationPhases, separationPhases } from './separation-phases';
import { joinedTable, separationTable } from './separation-table';
import type { PreparedCurve, PreparedStar } from './star-model';
import type { EccentricityLaw } from './types';

/** Columns are worked on in blocks of so many. */
const BLOCK = 8;
/** Doubles of a distance node: its weight, ln d and μ. */
const DISTANCE_DOUBLES = 3;
/** Kinds of rows that are added to, see addLevelMeans. */
const ROW_KINDS = 3;
/** Stored values in the place of a double. */
const SHORTS_PER_DOUBLE = 4;

interface Workplace {
  kernels: Kernels;
  shelve: (tables: readonly Float64Array[]) => Shelved;
}

let workplace: Workplace | null = null;

/** Chosen with the first map: whoever computes none compiles nothing. */
function workplaceHere(): Workplace {
  if (workplace) return workplace;
  const kernels = compiledKernels() ?? plainKernels;
  workplace = { kernels, shelve: newShelf(kernels) };
  return workplace;
}

/** Where a product lies in the kernels' memory: rows `stride` apart, from the first that is reached. */
interface Product {
  kernels: Kernels;
  memory: Float64Array;
  out: number;
  stride: number;
  firstColumn: number;
}

/**
 * Completeness of one curve as a product, C = W · H: weights from age alone, rows from the curve.
 *
 * @param star prepared star with one curve
 * @param inputs of the weights
 * @param law eccentricity law
 * @param logAxis ln a of the grid, [ln au], not modified
 * @param besides what is seen besides, added before the map is cut; null for nothing
 * @returns shape [mass, semiMajorAxis], row-major, 0 to 1
 */
export function levelMap(
  star: PreparedStar,
  inputs: WeightInputs,
  law: EccentricityLaw,
  logAxis: Float64Array,
  besides: Float64Array | null,
): Float64Array {
  const { kernels, memory, out, stride, firstColumn } = multiply(star, inputs, law, logAxis);
  const { masses } = inputs.paths;
  const columns = logAxis.length;
  kernels.pressRows(out, masses, columns, stride, firstColumn);
  const size = masses * columns;
  if (besides) for (let i = 0; i < size; i++) memory[out + i] += besides[i];
  kernels.clip(out, size);
  return memory.slice(out, out + size);
}

/**
 * The same as it is stored, see encodeMap, without the numbers in between.
 *
 * @returns shape [mass, semiMajorAxis], row-major, 0 to 65535; null where one is no number
 */
export function encodedLevelMap(
  star: PreparedStar,
  inputs: WeightInputs,
  law: EccentricityLaw,
  logAxis: Float64Array,
): Uint16Array | null {
  const { kernels, memory, out, stride, firstColumn } = multiply(star, inputs, law, logAxis);
  const { masses } = inputs.paths;
  const columns = logAxis.length;
  const at = SHORTS_PER_DOUBLE * (out + (masses + 1) * stride);
  const areNumbers = kernels.encodeRows(at, out, masses, columns, stride, firstColumn);
  if (areNumbers === 0) return null;
  return new Uint16Array(memory.buffer, 2 * at, masses * columns).slice();
}

function multiply(
  star: PreparedStar,
  inputs: WeightInputs,
  law: EccentricityLaw,
  logAxis: Float64Array,
): Product {
  const { kernels, shelve } = workplaceHere();
  const columns = logAxis.length;
  const { cellMag, masses } = inputs.paths;
  const stride = BLOCK * Math.ceil(columns / BLOCK);
  const [curve] = star.curves;
  // A cell more at each end: places are rounded in two ways.
  const range = cellRange(star, curve, cellMag);
  range.first--;
  range.count += 2;
  const lawRows = rowsOfLaw(law, logAxis, stride);
  const shelved = shelve([...lawRows.tables, ...weightTables(inputs)]);
  const places = shelved.places;
  const firstColumn = lawRows.phases ? firstReached(star, law, logAxis) : 0;
  const width = range.count + 1;
  const slotCount = ROW_KINDS * range.count;
  const slots = shelved.end;
  const star0 = slots + slotCount + (slotCount & 1);
  const curveDoubles = 3 * curve.limitMag.length + DISTANCE_DOUBLES * star.modulus.length;
  const freeRows = star0 + curveDoubles + (curveDoubles & 1);
  const rows = freeRows + stride * slotCount;
  const spare = rows + stride * width;
  const factors = spare + 2 * stride;
  const bands = factors + masses * width;
  const scratch = bands + 2 * masses;
  const scratchDoubles = weightScratch(inputs, range.count);
  const out = scratch + scratchDoubles + ((scratch + scratchDoubles) & 1);
  const encoded = Math.ceil((masses * columns) / SHORTS_PER_DOUBLE);
  const memory = kernels.reserve(out + (masses + 1) * stride + encoded);
  const distances = placeStar(memory, star0, star, curve);
  if (lawRows.phases) setPhases(kernels, lawRows.phases, places[0]);
  else setTable(kernels, law, places[0], places[1], columns);
  kernels.openRows(slots, slotCount, freeRows, stride, firstColumn);
  kernels.addLevelMeans(
    star0,
    curve.limitMag.length,
    distances,
    star.modulus.length,
    1 / cellMag,
    cellOfZero(cellMag) - range.first,
    range.count,
  );
  kernels.foldRows(rows, spare, stride, stride - firstColumn, range.count);
  const tables = places.slice(lawRows.tables.length);
  fillMagnitudeWeights(inputs, tables, range, kernels, factors, bands, scratch);
  kernels.multiplyRows(out, masses, factors, width, bands, rows, stride, firstColumn);
  return { kernels, memory, out, stride, firstColumn };
}

/** Writes curve and distances, and tells where the distances begin. */
function placeStar(
  memory: Float64Array,
  at: number,
  star: PreparedStar,
  { logSeparation, limitMag, coverage }: PreparedCurve,
): number {
  const points = limitMag.length;
  memory.set(logSeparation, at);
  memory.set(limitMag, at + points);
  memory.set(coverage, at + 2 * points);
  const distances = at + 3 * points;
  for (let l = 0; l < star.modulus.length; l++) {
    const node = distances + DISTANCE_DOUBLES * l;
    memory[node] = star.distances.weights[l];
    memory[node + 1] = star.logDistance[l];
    memory[node + 2] = star.modulus[l];
  }
  return distances;
}

/** What rows are taken from: the phases of an even axis, or the law's table and the axis. */
interface LawRows {
  phases: SeparationPhases | null;
  tables: Float64Array[];
}

interface KeptRows extends LawRows {
  law: EccentricityLaw;
  logAxis: Float64Array;
}

let lastRows: KeptRows | null = null;

function rowsOfLaw(law: EccentricityLaw, logAxis: Float64Array, stride: number): LawRows {
  const isKnown = lastRows && isSameLaw(lastRows.law, law);
  if (lastRows && isKnown && isSameAxis(lastRows.logAxis, logAxis)) return lastRows;
  const axisStep = evenStep(logAxis);
  const axis = logAxis.slice();
  if (axisStep === null) {
    lastRows = { law: { ...law }, logAxis: axis, phases: null, tables: [joinedTable(law), axis] };
  } else {
    const phases = separationPhases(law, logAxis[0], axisStep, stride);
    lastRows = { law: { ...law }, logAxis: axis, phases, tables: [phases.planes] };
  }
  return lastRows;
}

function setPhases(kernels: Kernels, phases: SeparationPhases, planes: number): void {
  kernels.setPhases(
    planes,
    phases.planeSize,
    phases.width,
    phases.phases,
    phases.beyond,
    phases.step,
    phases.top,
    phases.firstLogAxis,
    phases.axisStep,
  );
}

function setTable(
  kernels: Kernels,
  law: EccentricityLaw,
  table: number,
  axis: number,
  columns: number,
): void {
  const { start, step, cumulative } = separationTable(law);
  kernels.setTable(table, cumulative.length - 1, start, step, axis, columns);
}

/** Every number that a law has, whatever its kind: this is asked for every star. */
type LawNumbers = { law: string } & Partial<
  Record<'alpha' | 'beta' | 'eccentricity' | 'max' | 'sigma', number>
>;

function isSameLaw(a: EccentricityLaw, b: EccentricityLaw): boolean {
  const [x, y]: LawNumbers[] = [a, b];
  return (
    x.law === y.law &&
    x.alpha === y.alpha &&
    x.beta === y.beta &&
    x.eccentricity === y.eccentricity &&
    x.max === y.max &&
    x.sigma === y.sigma
  );
}

/** First column, by blocks, whose largest separation reaches the curve's beginning. */
function firstReached(star: PreparedStar, law: EccentricityLaw, logAxis: Float64Array): number {
  const nearest = star.logDistance.reduce((a, b) => Math.min(a, b));
  const wanted =
    star.curves[0].logSeparation[0] + nearest - Math.log(largestSeparation(law)) - 1e-9;
  let j = 0;
  while (j < logAxis.length && logAxis[j] < wanted) j++;
  return Math.min(logAxis.length - 1, j) & -BLOCK;
}
