import type { Transaction } from 'sequelize';
import type { MapState } from '@/lib/schemas/map-states';
import { CompletenessMapRow, type TargetRow } from './index';
import { findMapChange } from './map-changes';
import { planMaps } from './map-plan';

type Standing = Omit<MapState, 'target' | 'targetId' | 'mapId'>;

const plain = (standing: MapState['standing']): Standing => ({
  standing,
  reason: null,
  words: null,
});

/** How the map of each target of a survey stands against what its curves should give now. */
export async function readMapStates(
  survey: { collaborationId: string; id: string },
  transaction?: Transaction,
): Promise<MapState[]> {
  const { collaborationId, id: surveyId } = survey;
  const plan = await planMaps({ collaborationId, surveyId }, transaction);
  const stored = await CompletenessMapRow.findAll({
    attributes: ['id', 'digest', 'inputs', 'origin'],
    where: { id: plan.targets.flatMap(({ mapId }) => mapId ?? []), collaborationId },
    transaction,
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
