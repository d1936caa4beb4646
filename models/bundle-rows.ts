import { foldName } from '@/lib/formats/names';
import type { BundleContent } from '@/lib/schemas/bundles';
import type { AdoptedValues } from './adopted-values';
import { digestOf } from './digest';
import { CompanionRow, CompletenessMapRow, ContrastCurveRow, StarRow, TargetRow } from './index';

const ID = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g;

/** Every id that a bundle gives to something of its own. */
export function idsOf(content: BundleContent): string[] {
  const { recipe, stars, targets, curves, companions, coolingTables } = content;
  return [
    ...recipe.surveys,
    recipe.population,
    ...(recipe.sample ? [recipe.sample] : []),
    ...(recipe.combination ? [recipe.combination] : []),
    ...stars,
    ...targets,
    ...curves,
    ...companions,
    ...coolingTables,
  ].map(({ id }) => id);
}

/** The same content under other ids, wherever they stand; definitions get the digests that follow. */
export function underOtherIds(
  content: BundleContent,
  idFor: ReadonlyMap<string, string>,
): BundleContent {
  const text = JSON.stringify(content).replace(ID, (id) => idFor.get(id) ?? id);
  const renamed = JSON.parse(text) as BundleContent;
  for (const version of [renamed.recipe.sample, renamed.recipe.combination]) {
    if (version) version.digest = digestOf(version.definition);
  }
  return renamed;
}

type Open = CompanionRow['status'];
const OPEN: readonly Open[] = ['candidate', 'ambiguous'];

/** The rows of a bundle as the tables would hold them; nothing is stored by making them. */
export function rowsOfBundle(content: BundleContent, collaborationId: string) {
  const stars = content.stars.map((star) =>
    StarRow.build({ ...star, collaborationId, foldedName: foldName(star.name) }),
  );
  const maps = content.maps.map(({ nodeValues, ...map }) =>
    CompletenessMapRow.build({
      ...map,
      collaborationId,
      origin: 'uploaded',
      nodeValues: Buffer.from(nodeValues, 'base64'),
    }),
  );
  const curves = content.curves.map((curve) =>
    ContrastCurveRow.build({ ...curve, collaborationId }),
  );
  const companions = content.companions.map((companion) =>
    CompanionRow.build({
      ...companion,
      collaborationId,
      foldedName: foldName(companion.name),
    }),
  );
  const mapOf = new Map(maps.map((map) => [map.digest, map]));
  const starOf = new Map(stars.map((star) => [star.id, star]));
  const targets = content.targets.map(({ mapDigest, ...target }) => {
    const map = mapDigest === null ? undefined : mapOf.get(mapDigest);
    const row = TargetRow.build({
      ...target,
      collaborationId,
      foldedName: foldName(target.name),
      mapId: map?.id ?? null,
      mapState: map ? 'ready' : 'none',
    });
    return Object.assign(row, {
      star: starOf.get(target.starId) as StarRow,
      companions: companions.filter(
        ({ targetId, status }) => targetId === target.id && OPEN.includes(status),
      ),
    });
  });
  return { stars, targets, curves, companions, maps };
}

/** Adopted values of a bundle by star, as the tables would give them. */
export function adoptedOfBundle({ recipe }: BundleContent): AdoptedValues {
  const adopted: AdoptedValues = {
    age: new Map(),
    distance: new Map(),
    newest: recipe.adopted.newest,
  };
  for (const { quantity, starId, value, source, table } of recipe.adopted.values) {
    adopted[quantity].set(starId, { value: value as never, source, table });
  }
  return adopted;
}
