import type { Fault } from '@/lib/errors';
import type { MapRecord, Note } from '@/lib/formats';
import { ENGINE_VERSION } from '@/lib/sensitivity';
import { CompletenessMapRow, ContrastCurveRow, TargetRow } from '@/models';
import { canonicalJson, sha256Hex } from '@/models/digest';
import { packMap } from '@/models/map-values';
import { type Plan, type PlanContext, type PlannedItem, summariseItems } from './plan';
import { TargetNames } from './target-names';

/** Cells become nodes at their geometric centres: the stored form holds values at points. */
function nodesOf(edges: number[]): number[] {
  return edges.slice(1).map((upper, i) => Math.sqrt(edges[i] * upper));
}

function asNodes(record: MapRecord) {
  if (record.nodeKind === 'nodes') return record;
  return {
    ...record,
    massMjup: nodesOf(record.massMjup),
    semiMajorAxisAu: nodesOf(record.semiMajorAxisAu),
  };
}

/** A ready map stands for its target until a newer one is stored; a target has a map or curves, not both. */
export async function planCompletenessMaps(
  context: PlanContext,
  records: MapRecord[],
): Promise<Plan> {
  const { survey } = context;
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  const names = new TargetNames(targets);
  const curves = await ContrastCurveRow.findAll({
    where: { targetId: targets.map((target) => target.id), replacedAt: null },
    attributes: ['targetId'],
  });
  const hasCurve = new Set(curves.map((curve) => curve.targetId));
  const items: PlannedItem[] = [];
  const faults: Fault[] = [];
  const notes: Note[] = [];
  const steps: { target: TargetRow; record: MapRecord }[] = [];
  for (const record of records) {
    const target = names.find(record.target);
    if (!target) continue;
    if (hasCurve.has(target.id)) {
      faults.push({
        code: 'both-given',
        item: `target "${target.name}"`,
        message: `"${target.name}" has a contrast curve; expected a curve or a ready map`,
      });
    }
    if (record.nodeKind === 'cells') {
      notes.push({
        code: 'cells-to-nodes',
        level: 'information',
        item: `target "${target.name}"`,
        message:
          'The axes are cell edges; each value is stored at the geometric centre of its cell',
      });
    }
    const map = asNodes(record);
    items.push({
      name: target.name,
      outcome: target.mapId ? 'replaces' : 'new',
      summary: `${map.massMjup.length} masses × ${map.semiMajorAxisAu.length} semi-major axes`,
    });
    steps.push({ target, record: map });
  }
  return {
    items,
    faults,
    notes,
    summary: summariseItems(items, 'map'),
    needsMaps: false,
    apply: async (transaction, uploadId) => {
      for (const { target, record } of steps) {
        const packed = packMap(Float64Array.from(record.completeness));
        const inputs = {
          origin: 'uploaded',
          nodeKind: record.nodeKind,
          massMjup: record.massMjup,
          semiMajorAxisAu: record.semiMajorAxisAu,
          checksum: packed.checksum,
        };
        const digest = sha256Hex(canonicalJson(inputs));
        const [map] = await CompletenessMapRow.findOrCreate({
          where: { collaborationId: survey.collaborationId, digest },
          defaults: {
            collaborationId: survey.collaborationId,
            digest,
            origin: 'uploaded',
            engineVersion: ENGINE_VERSION,
            massMjup: record.massMjup,
            semiMajorAxisAu: record.semiMajorAxisAu,
            ...packed,
            inputs: { ...inputs, target: target.name, uploadId },
          },
          transaction,
        });
        await target.update({ mapId: map.id, mapState: 'ready', mapFault: null }, { transaction });
      }
    },
  };
}
