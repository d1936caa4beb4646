import type { MapState } from '@/lib/schemas/map-states';
import { CompletenessMapRow, type TargetRow } from './index';
import { findMapChange } from './map-changes';
import { planMaps } from './map-plan';
import { readMapStamps } from './map-stamps';

type Standing = Omit<MapState, 'target' | 'targetId' | 'mapId'>;

const plain = (standing: MapState['standing']): Standing => ({
  standing,
  reason: null,
  words: null,
});

interface Survey {
  collaborationId: string;
  id: string;
}

/** Enough for fifty surveys of 500 stars, some 10 MB; the oldest entry goes first. */
const CACHE_SIZE = 100;
const cache = new Map<string, { stamp: string; states: MapState[] }>();

/**
 * How the map of each target stands against what its curves should give now. To work that out takes
 * a digest a target, so it is done again only where something has changed that it rests on.
 */
export async function readMapStates(surveys: Survey[]): Promise<Map<string, MapState[]>> {
  const stamps = await readMapStamps(surveys.map(({ id }) => id));
  const found = new Map<string, MapState[]>();
  for (const survey of surveys) {
    const stamp = stamps.get(survey.id);
    const known = cache.get(survey.id);
    if (known && known.stamp === stamp) {
      found.set(survey.id, known.states);
      continue;
    }
    const states = await compareMaps(survey);
    found.set(survey.id, states);
    // Read before what it stands for: a change in between makes it differ the next time.
    if (stamp !== undefined) cache.set(survey.id, { stamp, states });
  }
  while (cache.size > CACHE_SIZE) cache.delete(cache.keys().next().value as string);
  return found;
}

async function compareMaps({ collaborationId, id: surveyId }: Survey): Promise<MapState[]> {
  const plan = await planMaps({ collaborationId, surveyId });
  const stored = await CompletenessMapRow.findAll({
    attributes: ['id', 'digest', 'inputs', 'origin'],
    where: { id: plan.targets.flatMap(({ mapId }) => mapId ?? []), collaborationId },
  });
  const mapOf = new Map(stored.map((map) => [map.id, map]));
  const wantedOf = new Map(plan.wanted.map((wanted) => [wanted.targetId, wanted]));
  const faultOf = new Map(plan.faults.map(({ targetId, fault }) => [targetId, fault]));

  const standingOf = (target: TargetRow): Standing => {
    const map = target.mapId === null ? undefined : mapOf.get(target.mapId);
    const fault = faultOf.get(target.id);
    if (fault !== undefined) return { ...plain('failed'), words: fault };
    const wanted = wantedOf.get(target.id);
    if (!wanted) return plain(map ? 'uploaded' : 'none');
    if (target.mapState === 'failed') return { ...plain('failed'), words: target.mapFault };
    if (!map) {
      return { standing: 'missing', reason: 'not-computed', words: 'it is not computed yet' };
    }
    if (map.digest === wanted.digest) return plain('current');
    const change = findMapChange(map.inputs, wanted.inputs, plan.recipe.coolingName);
    const { reason, words } = change ?? { reason: 'other' as const, words: 'its inputs differ' };
    return { standing: 'stale', reason, words };
  };
  return plan.targets.map((target) => ({
    target: target.name,
    targetId: target.id,
    mapId: target.mapId,
    ...standingOf(target),
  }));
}
