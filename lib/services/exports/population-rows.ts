import { populationColumns, tableOfRows, type WrittenCell, type WrittenTable } from '@/lib/formats';
import { describePopulation } from '@/lib/inference';
import {
  type AxisShape,
  axisShapes,
  fromLogIndex,
  hostScalingOf,
  type Population,
} from '@/lib/population';
import { statedRange } from '../export-limits';

const indexOf = (shape: AxisShape) => (shape.shape === 'power-law' ? shape.index : null);
const linear = (index: number | null) => (index === null ? null : fromLogIndex(index, 'linear'));

export interface ListedPopulation {
  key: string;
  version: number;
  name: string;
  digest: string;
  definition: Population;
}

function populationRow(listed: ListedPopulation): Record<string, WrittenCell> {
  const { definition } = listed;
  const range = statedRange(definition);
  const shapes = definition.form === 'systems' ? null : axisShapes(definition);
  const massIndex = shapes && indexOf(shapes.mass);
  const axisIndex = shapes && indexOf(shapes.semiMajorAxis);
  const scaling = hostScalingOf(definition);
  const isRatio = definition.form === 'mass-ratio';
  return {
    population: listed.key,
    version: listed.version,
    name: listed.name,
    form: definition.form,
    description: describePopulation(definition),
    mass_min: range.massMinMjup,
    mass_max: range.massMaxMjup,
    semi_major_axis_min: range.semiMajorAxisMinAu,
    semi_major_axis_max: range.semiMajorAxisMaxAu,
    mass_ratio_min: isRatio ? definition.massRatioMin : null,
    mass_ratio_max: isRatio ? definition.massRatioMax : null,
    mass_index_log: massIndex,
    mass_index_linear: linear(massIndex),
    semi_major_axis_index_log: axisIndex,
    semi_major_axis_index_linear: linear(axisIndex),
    host_mass_index: scaling?.index ?? null,
    host_mass_reference: scaling?.referenceMsun ?? null,
    digest: listed.digest,
  };
}

/** Populations with their laws in words and their indices in both conventions. */
export function populationsTable(
  head: Pick<WrittenTable, 'title' | 'provenance'>,
  populations: readonly ListedPopulation[],
): WrittenTable {
  return tableOfRows(
    { name: 'populations', ...head },
    populationColumns,
    populations.map(populationRow),
  );
}
