import { QueryTypes } from 'sequelize';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { marginalWeights, type PowerLawPopulation, type ShapedPopulation } from '@/lib/population';
import type { MapSettings } from '@/lib/schemas/surveys';
import type { YardstickView } from '@/lib/schemas/yardstick';
import {
  type CompletenessMap,
  combineDeepest,
  combineIndependent,
  decodeMap,
  type MapGrid,
  regridNodes,
} from '@/lib/sensitivity';
import { database } from '@/models';
import { type PassingMap, streamMaps } from '@/models/map-stream';
import { LEAD_ANALYSIS } from './lead-analysis';

/** One map seen through a population: its mean, and its profile along semi-major axis. */
export interface MapSummary {
  probability: number;
  /** Mass-averaged completeness at each node of the grid asked for. */
  profile: Float64Array;
}

/** Enough for four surveys of 5000 stars, some 25 MB; the oldest entry goes first. */
const CACHE_SIZE = 20_000;
/** Other requests get their turn between two parts. */
const READ_AT_ONCE = 100;
const cache = new Map<string, MapSummary>();

/** For a collaboration without a lead analysis or shared population: flat in both logarithms. */
const FLAT: PowerLawPopulation = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 30,
  semiMajorAxisMinAu: 10,
  semiMajorAxisMaxAu: 300,
  massIndex: 0,
  semiMajorAxisIndex: 0,
};

export interface Yardstick {
  population: PowerLawPopulation | ShapedPopulation;
  /** What summaries of maps are kept under. */
  key: string;
  /** Nobody asked for it: lists state no sum under it. */
  isFlat: boolean;
  /** What answers say of it. */
  view: YardstickView;
}

interface Chosen {
  definition: PowerLawPopulation | ShapedPopulation;
  digest: string;
  name: string;
  number: number;
  version: number;
  analysis: number | null;
}

/** Mass ratios depend on each star's mass, tabulated systems on whole systems. */
const CHOSEN = `
  with lead as (${LEAD_ANALYSIS})
  select p.definition, p.digest, p.name, p.number, p.version, lead.number as analysis
  from population p left join lead on p.id = (lead.recipe->>'populationId')::uuid
  where p.collaboration_id = $1 and p.definition->>'form' in ('power-law', 'shaped')
    and (lead.id is not null or p.is_shared)
  order by lead.id is not null desc, p.created_at desc
  limit 1`;

const rangesOf = ({
  massMinMjup,
  massMaxMjup,
  semiMajorAxisMinAu,
  semiMajorAxisMaxAu,
}: Yardstick['population']) => ({
  massMinMjup,
  massMaxMjup,
  semiMajorAxisMinAu,
  semiMajorAxisMaxAu,
});

const FLAT_YARDSTICK: Yardstick = {
  population: FLAT,
  key: 'flat',
  isFlat: true,
  view: { population: null, key: null, version: null, analysis: null, ...rangesOf(FLAT) },
};

/**
 * The population through which lists show sensitivity: that of the lead analysis where it has one
 * box for all stars, else the newest such one that is shared.
 */
export async function currentYardstick(collaborationId: string): Promise<Yardstick> {
  const [chosen] = await database().query<Chosen>(CHOSEN, {
    bind: [collaborationId],
    type: QueryTypes.SELECT,
  });
  if (!chosen) return FLAT_YARDSTICK;
  const { definition, digest, name, number, version, analysis } = chosen;
  return {
    population: definition,
    key: digest,
    isFlat: false,
    view: {
      population: name,
      key: `P-${number}`,
      version,
      analysis: analysis === null ? null : `A-${analysis}`,
      ...rangesOf(definition),
    },
  };
}

/** Sees maps through one population, on one grid; maps that hold nothing of it see nothing of it. */
function summariser(
  { population }: Yardstick,
  grid: MapGrid,
): (map: CompletenessMap) => MapSummary {
  const weights = marginalWeights(grid, population);
  const columns = grid.semiMajorAxisAu.length;
  return (map) => {
    const regridded = regridNodes(map, grid).map.completeness;
    const profile = new Float64Array(columns);
    weights.mass.forEach((weight, i) => {
      if (weight === 0) return;
      for (let j = 0; j < columns; j++) profile[j] += weight * regridded[i * columns + j];
    });
    let probability = 0;
    for (let j = 0; j < columns; j++) probability += weights.semiMajorAxis[j] * profile[j];
    return { probability, profile };
  };
}

const decoded = ({ massMjup, semiMajorAxisAu, encoded }: PassingMap): CompletenessMap => ({
  massMjup,
  semiMajorAxisAu,
  completeness: decodeMap(encoded),
});

/** The grid on which a survey's maps are made. */
export function gridOfSettings({ massMjup: mass, semiMajorAxisAu: axis }: MapSettings): MapGrid {
  return {
    massMjup: logSpacedAxis(mass.min, mass.max, mass.count),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, axis.count),
  };
}

/** Maps of one star, and how they become one map; a single map stays as it is. */
export interface MapsTogether {
  mapIds: readonly string[];
  rule: 'deepest' | 'independent';
}

const nameOf = ({ mapIds, rule }: MapsTogether) =>
  mapIds.length === 1 ? mapIds[0] : `${rule}:${mapIds.join('+')}`;

/**
 * Summaries of maps that are put together star by star; each group is read and averaged once per
 * population and grid.
 *
 * @returns one for each group, in their order; undefined where a map of it is not stored
 */
export async function summariseTogether(
  collaborationId: string,
  groups: readonly MapsTogether[],
  yardstick: Yardstick,
  grid: MapGrid,
): Promise<(MapSummary | undefined)[]> {
  const gridKey = `${grid.massMjup.length}x${grid.semiMajorAxisAu.length}:${grid.semiMajorAxisAu[0]}:${grid.semiMajorAxisAu.at(-1)}:${grid.massMjup[0]}:${grid.massMjup.at(-1)}`;
  const keyOf = (group: MapsTogether) => `${nameOf(group)}|${yardstick.key}|${gridKey}`;
  const missing = [...new Map(groups.map((group) => [keyOf(group), group]))].filter(
    ([key]) => !cache.has(key),
  );
  const summarise = missing.length > 0 ? summariser(yardstick, grid) : null;
  for (let start = 0; start < missing.length; start += READ_AT_ONCE) {
    const part = missing.slice(start, start + READ_AT_ONCE);
    const keys = part.flatMap(([, { mapIds }]) => mapIds);
    const owner = part.flatMap(([, { mapIds }], i) => mapIds.map(() => i));
    let held: CompletenessMap[] = [];
    await streamMaps(collaborationId, { by: 'id', keys, gaps: 'skip' }, (map, place) => {
      if (owner[place] !== owner[place - 1]) held = [];
      held.push(decoded(map));
      const [key, { mapIds, rule }] = part[owner[place]];
      if (held.length < mapIds.length) return;
      const combine = rule === 'independent' ? combineIndependent : combineDeepest;
      const summary = summarise?.(held.length === 1 ? held[0] : combine(held));
      if (summary) cache.set(key, summary);
    });
  }
  const found = groups.map((group) => cache.get(keyOf(group)));
  while (cache.size > CACHE_SIZE) cache.delete(cache.keys().next().value as string);
  return found;
}

/** Summaries of maps by id; each map is read and averaged once per population and grid. */
export async function summariseMaps(
  collaborationId: string,
  mapIds: string[],
  yardstick: Yardstick,
  grid: MapGrid,
): Promise<Map<string, MapSummary>> {
  const alone = mapIds.map((id): MapsTogether => ({ mapIds: [id], rule: 'deepest' }));
  const summaries = await summariseTogether(collaborationId, alone, yardstick, grid);
  const found = new Map<string, MapSummary>();
  mapIds.forEach((id, i) => {
    const summary = summaries[i];
    if (summary) found.set(id, summary);
  });
  return found;
}
