import {
  BUILT_IN_LAW_NAME,
  BUILT_IN_LAW_RANGE,
  builtInMagnitudes,
  massesOutsideValidity,
} from './built-in-law';
import { checkCoolingTable, tableLookup } from './cooling-table';
import type { CoolingRelation, CoolingReport, CoolingTable, SensitivitySettings } from './types';

/** An age node that the cooling relation does not cover, under the rule that refuses it. */
export class AgeOutsideTableError extends RangeError {
  constructor(
    readonly starName: string,
    readonly ageMyr: number,
    readonly range: readonly [number, number],
    readonly coolingName: string,
  ) {
    super(
      `age node of ${starName} must be between ${range[0]} and ${range[1]} Myr for ${coolingName}, got ${ageMyr}`,
    );
    this.name = 'AgeOutsideTableError';
  }
}

/** Absolute magnitudes of every mass node at every age node of one star. */
export interface CooledNodes {
  /** Shape [mass, age], row-major, [mag]; Infinity where nothing can be detected. */
  magnitudes: Float64Array;
  report: CoolingReport;
}

type AgePolicy = Pick<SensitivitySettings, 'massOutsideTable' | 'ageOutsideTable'>;

/**
 * Magnitudes of a grid's masses at a star's age nodes, with the rules for what lies outside.
 *
 * @param relation built-in law, or a table
 * @param band the curve's band
 * @param massMjup mass nodes, [M_Jup], not modified
 * @param agesMyr age nodes, [Myr], not modified
 * @param policy what to do outside the relation
 * @param starName for the error
 * @throws AgeOutsideTableError for an age node outside when ages are refused
 * @throws RangeError for an unknown band, a broken table, or a mass outside the built-in law's range
 */
export function coolNodes(
  relation: CoolingRelation,
  band: string,
  massMjup: Float64Array,
  agesMyr: Float64Array,
  policy: AgePolicy,
  starName: string,
): CooledNodes {
  const { name, range } = ageRange(relation);
  let ageNodesClamped = 0;
  const ages = agesMyr.map((age) => {
    if (age >= range[0] && age <= range[1]) return age;
    if (policy.ageOutsideTable === 'refuse') {
      throw new AgeOutsideTableError(starName, age, range, name);
    }
    ageNodesClamped++;
    return Math.min(range[1], Math.max(range[0], age));
  });
  const flags = new Set<number>();
  const magnitudes =
    relation.kind === 'built-in'
      ? lawMagnitudes(band, massMjup, ages, flags)
      : tableMagnitudes(relation.table, band, massMjup, ages, policy, flags);
  const flaggedMassNodes = [...flags].sort((a, b) => a - b);
  const isLaw = relation.kind === 'built-in';
  return {
    magnitudes,
    report: {
      massNodesOutside: isLaw ? 0 : flaggedMassNodes.length,
      ageNodesClamped,
      lawNodesOutsideValidity: isLaw ? flaggedMassNodes.length : 0,
      flaggedMassNodes,
    },
  };
}

/**
 * The report of coolNodes without the nodes, where the relation covers every age and mass.
 *
 * @param relation built-in law, or a table
 * @param band the curve's band
 * @param massMjup mass nodes, [M_Jup], not modified
 * @param endsMyr least and greatest age node, [Myr]
 * @returns null where coolNodes has to look at every node
 * @throws RangeError for an unknown band, a broken table, or a mass outside the built-in law's range
 */
export function reportWithinRelation(
  relation: CoolingRelation,
  band: string,
  massMjup: Float64Array,
  endsMyr: Float64Array,
): CoolingReport | null {
  const [least, most] = endsMyr;
  const { range } = ageRange(relation);
  if (!(least >= range[0] && most <= range[1])) return null;
  // The law's temperature falls with age, so what holds at both ends holds between them.
  if (relation.kind === 'built-in') {
    return reportWithin(massesOutsideValidity(massMjup, endsMyr, band));
  }
  return coversAll(relation.table, band, massMjup) ? reportWithin([]) : null;
}

/** Every age lies within the relation; only the built-in law has masses outside its validity. */
const reportWithin = (flaggedMassNodes: number[]): CoolingReport => ({
  massNodesOutside: 0,
  ageNodesClamped: 0,
  lawNodesOutsideValidity: flaggedMassNodes.length,
  flaggedMassNodes,
});

const completeBands = new WeakMap<Float64Array, boolean>();

/** Whether a band has no gap and the masses lie within the table, so that nothing can be flagged. */
function coversAll(table: CoolingTable, band: string, massMjup: Float64Array): boolean {
  checkCoolingTable(table);
  const values = Object.hasOwn(table.magnitudes, band) ? table.magnitudes[band] : null;
  if (values === null) return false;
  let isComplete = completeBands.get(values);
  if (isComplete === undefined) {
    isComplete = !values.some(Number.isNaN);
    completeBands.set(values, isComplete);
  }
  const tabulated = table.massMjup;
  return (
    isComplete &&
    massMjup[0] >= tabulated[0] &&
    massMjup[massMjup.length - 1] <= tabulated[tabulated.length - 1]
  );
}

/** How a result names the relation. */
export function coolingName(relation: CoolingRelation): string {
  return relation.kind === 'built-in' ? BUILT_IN_LAW_NAME : relation.table.name;
}

/**
 * Ages that the relation covers, [Myr], and its name.
 *
 * @throws RangeError for a broken table
 */
export function ageRange(relation: CoolingRelation): {
  name: string;
  range: readonly [number, number];
} {
  const name = coolingName(relation);
  if (relation.kind === 'built-in') {
    return { name, range: [BUILT_IN_LAW_RANGE.ageMinMyr, BUILT_IN_LAW_RANGE.ageMaxMyr] };
  }
  checkCoolingTable(relation.table);
  const { ageMyr } = relation.table;
  return { name, range: [ageMyr[0], ageMyr[ageMyr.length - 1]] };
}

function lawMagnitudes(
  band: string,
  massMjup: Float64Array,
  ages: Float64Array,
  flags: Set<number>,
): Float64Array {
  const { magnitudes, outsideValidity } = builtInMagnitudes(massMjup, ages, band);
  for (const node of outsideValidity) flags.add(node);
  return magnitudes;
}

function tableMagnitudes(
  table: CoolingTable,
  band: string,
  massMjup: Float64Array,
  ages: Float64Array,
  policy: AgePolicy,
  flags: Set<number>,
): Float64Array {
  const lookup = tableLookup(table, band);
  const magnitudes = new Float64Array(massMjup.length * ages.length);
  for (let k = 0; k < ages.length; k++) {
    const edge =
      policy.massOutsideTable === 'edge' ? heaviestCovered(table, lookup, ages[k]) : null;
    for (let i = 0; i < massMjup.length; i++) {
      let magnitude = lookup.magnitude(massMjup[i], ages[k]);
      if (Number.isNaN(magnitude)) {
        flags.add(i);
        const isAbove = edge !== null && massMjup[i] > edge.massMjup;
        magnitude = isAbove ? edge.magnitude : Infinity;
      }
      magnitudes[i * ages.length + k] = magnitude;
    }
  }
  return magnitudes;
}

/** The heaviest tabulated mass that has a magnitude at this age. */
function heaviestCovered(
  table: CoolingTable,
  lookup: { magnitude(massMjup: number, ageMyr: number): number },
  ageMyr: number,
): { massMjup: number; magnitude: number } | null {
  for (let i = table.massMjup.length - 1; i >= 0; i--) {
    const magnitude = lookup.magnitude(table.massMjup[i], ageMyr);
    if (!Number.isNaN(magnitude)) return { massMjup: table.massMjup[i], magnitude };
  }
  return null;
}
