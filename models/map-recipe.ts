import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { logSpacedAxis } from '@/lib/numerics/grid';
import type { MapSettings } from '@/lib/schemas/surveys';
import {
  type CoolingRelation,
  ENGINE_VERSION,
  type MapGrid,
  type SensitivitySettings,
  type StarInputs,
} from '@/lib/sensitivity';
import { digestOf } from './digest';
import { CoolingTableRow } from './index';
import { requireFacts } from './star-facts';
import type { OwnCurve } from './star-inputs';

/** How a survey's curves become maps: its settings with the cooling relation that they name. */
export interface MapRecipe {
  grid: MapGrid;
  settings: SensitivitySettings;
  cooling: CoolingRelation;
  /** Name for conditions and provenance. */
  coolingName: string;
  coolingDigest: string;
}

export function gridOf(settings: MapSettings): MapGrid {
  const { massMjup: mass, semiMajorAxisAu: axis } = settings;
  return {
    massMjup: logSpacedAxis(mass.min, mass.max, mass.count),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, axis.count),
  };
}

const BUILT_IN: Pick<MapRecipe, 'cooling' | 'coolingName' | 'coolingDigest'> = {
  cooling: { kind: 'built-in' },
  coolingName: 'built-in approximate cooling law',
  coolingDigest: 'built-in',
};

async function loadCooling(
  collaborationId: string,
  { cooling }: MapSettings,
  transaction?: Transaction,
): Promise<Pick<MapRecipe, 'cooling' | 'coolingName' | 'coolingDigest'>> {
  if (cooling.kind === 'built-in') return BUILT_IN;
  const row = await CoolingTableRow.findOne({
    where: { id: cooling.coolingTableId, collaborationId },
    transaction,
  });
  if (!row) {
    throw new InputError({
      code: 'no-cooling-table',
      message: 'The cooling table that the survey names is not there; choose another',
    });
  }
  return coolingOf(row);
}

/** A stored cooling table as the engine takes it. */
function coolingOf(
  row: Pick<CoolingTableRow, 'name' | 'massMjup' | 'ageMyr' | 'magnitudes' | 'digest'>,
): Pick<MapRecipe, 'cooling' | 'coolingName' | 'coolingDigest'> {
  const magnitudes = Object.entries(row.magnitudes).map(([band, values]) => [
    band,
    Float64Array.from(values, (value) => value ?? Number.NaN),
  ]);
  return {
    cooling: {
      kind: 'table',
      table: {
        name: row.name,
        massMjup: Float64Array.from(row.massMjup),
        ageMyr: Float64Array.from(row.ageMyr),
        magnitudes: Object.fromEntries(magnitudes),
      },
    },
    coolingName: `cooling table ${row.name}`,
    coolingDigest: row.digest,
  };
}

/** The rules of a survey for the engine; what is switched off is absent, so that digests stay. */
function rulesOf(given: MapSettings): SensitivitySettings {
  const { eccentricity, threshold, massOutsideTable, ageOutsideTable, ageNodesPerSide } = given;
  const { smallSample, unstableZone, candidates, candidateHalfWidthArcsec, fieldAge } = given;
  return {
    eccentricity,
    threshold,
    massOutsideTable,
    ageOutsideTable,
    ...(ageNodesPerSide !== undefined && { ageNodesPerSide }),
    // Settings stored before there was such a rule do not hold it.
    ...(smallSample && { smallSample }),
    ...(unstableZone === 'remove' && { unstableZone }),
    ...(candidates === 'cut' && { candidates: { halfWidthArcsec: candidateHalfWidthArcsec } }),
    ...(fieldAge && { fieldAge }),
  };
}

export async function loadRecipe(
  collaborationId: string,
  settings: MapSettings,
  transaction?: Transaction,
): Promise<MapRecipe> {
  return {
    grid: gridOf(settings),
    settings: rulesOf(settings),
    ...(await loadCooling(collaborationId, settings, transaction)),
  };
}

/** The recipe of settings with the cooling table that they name; none for the built-in law. */
export function recipeWithTable(
  settings: MapSettings,
  table: Parameters<typeof coolingOf>[0] | null,
): MapRecipe {
  return {
    grid: gridOf(settings),
    settings: rulesOf(settings),
    ...(table ? coolingOf(table) : BUILT_IN),
  };
}

/**
 * Everything that a map's values follow from; its digest is the map's. A fact of the star stands
 * here only where a rule uses it.
 *
 * @throws MissingInput for a fact that a rule needs and the tables hold half of
 */
export function mapInputs(star: StarInputs, ownCurves: OwnCurve[], recipe: MapRecipe) {
  const { candidates, fieldAge, unstableZone } = recipe.settings;
  const { candidates: sources, membershipProbability, stellarCompanion } = star;
  requireFacts(ownCurves, recipe.settings);
  return {
    kind: 'computed',
    engineVersion: ENGINE_VERSION,
    curves: ownCurves.map(({ curve }) => curve.digest).sort(),
    hostMags: star.hostMags,
    age: star.age,
    distance: star.distance,
    ...(fieldAge && membershipProbability !== undefined && { membershipProbability }),
    ...(unstableZone && stellarCompanion && { stellarCompanion }),
    ...(candidates && sources && { candidates: sources }),
    cooling: recipe.coolingDigest,
    settings: recipe.settings,
    grid: recipe.grid,
  };
}

export const mapDigest = (inputs: ReturnType<typeof mapInputs>): string => digestOf(inputs);
