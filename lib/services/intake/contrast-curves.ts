import type { Fault } from '@/lib/errors';
import type { CurveRecord, Note } from '@/lib/formats';
import { CompletenessMapRow, ContrastCurveRow, TargetRow } from '@/models';
import { canonicalJson, sha256Hex } from '@/models/digest';
import { inParts, type Plan, type PlanContext, type PlannedItem, summariseItems } from './plan';
import { TargetNames } from './target-names';

const digestOf = (record: CurveRecord) =>
  sha256Hex(
    canonicalJson({
      band: record.band,
      epoch: record.epoch,
      nSigma: record.nSigma,
      separationArcsec: record.separationArcsec,
      contrastMag: record.contrastMag,
      coverage: record.coverage,
    }),
  );

const keyOf = (targetId: string, band: string, epoch: string | null) =>
  `${targetId}|${band}|${epoch ?? ''}`;

/** What keeps a curve from becoming a map; the rest of the file goes on. */
function obstacleOf(target: TargetRow, band: string): string | null {
  if (target.ageMyr === null && target.ageMinMyr === null) return 'no age';
  if (target.distancePc === null && target.parallaxMas === null)
    return 'no distance and no parallax';
  if (!target.magnitudes[band]) return `no magnitude in ${band}`;
  return null;
}

/** A curve replaces the one of the same target, band and epoch; runs keep the maps made from the old one. */
export async function planContrastCurves(
  context: PlanContext,
  records: CurveRecord[],
): Promise<Plan> {
  const { survey } = context;
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  const names = new TargetNames(targets);
  const [current, uploadedMaps] = await Promise.all([
    ContrastCurveRow.findAll({
      where: { targetId: targets.map((target) => target.id), replacedAt: null },
      attributes: ['id', 'targetId', 'band', 'epoch', 'digest'],
    }),
    CompletenessMapRow.findAll({
      where: {
        id: targets.flatMap((target) => (target.mapId ? [target.mapId] : [])),
        origin: 'uploaded',
      },
      attributes: ['id'],
    }),
  ]);
  const existing = new Map(current.map((row) => [keyOf(row.targetId, row.band, row.epoch), row]));
  const ready = new Set(uploadedMaps.map((row) => row.id));
  const items: PlannedItem[] = [];
  const faults: Fault[] = [];
  const notes: Note[] = [];
  const steps: {
    record: CurveRecord;
    target: TargetRow;
    replaces: ContrastCurveRow | undefined;
    digest: string;
  }[] = [];
  for (const record of records) {
    const target = names.find(record.target);
    if (!target) continue;
    if (target.mapId && ready.has(target.mapId)) {
      faults.push({
        code: 'both-given',
        line: record.firstLine,
        item: `target "${target.name}"`,
        message: `"${target.name}" has a ready completeness map; expected a curve or a ready map`,
      });
    }
    const digest = digestOf(record);
    const replaces = existing.get(keyOf(target.id, record.band, record.epoch));
    const outcome = replaces ? (replaces.digest === digest ? 'unchanged' : 'replaces') : 'new';
    const separations = record.separationArcsec;
    const summary = `${separations.length} points, ${separations[0]}–${separations[separations.length - 1]}″, ${record.band}, ${record.nSigma} σ`;
    items.push({ name: target.name, outcome, summary });
    const obstacle = obstacleOf(target, record.band);
    if (obstacle) {
      notes.push({
        code: 'value-missing',
        level: 'warning',
        line: record.firstLine,
        item: `target "${target.name}"`,
        message: `"${target.name}" has ${obstacle}: this curve cannot become a completeness map`,
      });
    }
    if (outcome !== 'unchanged') steps.push({ record, target, replaces, digest });
  }
  return {
    items,
    faults,
    notes,
    summary: summariseItems(items, 'curve'),
    needsMaps: steps.length > 0,
    apply: async (transaction, uploadId) => {
      const replacedIds = steps.flatMap((step) => (step.replaces ? [step.replaces.id] : []));
      await ContrastCurveRow.update(
        { replacedAt: new Date() },
        { where: { id: replacedIds }, transaction },
      );
      const rows = steps.map(({ record, target, digest }) => ({
        collaborationId: survey.collaborationId,
        targetId: target.id,
        uploadId,
        band: record.band,
        epoch: record.epoch,
        nSigma: record.nSigma,
        separationArcsec: record.separationArcsec,
        contrastMag: record.contrastMag,
        coverage: record.coverage,
        instrument: record.instrument,
        reference: record.reference,
        digest,
      }));
      await inParts(rows, (part) => ContrastCurveRow.bulkCreate(part, { transaction }));
      await TargetRow.update(
        { mapState: 'waiting', mapFault: null },
        { where: { id: steps.map((step) => step.target.id) }, transaction },
      );
    },
  };
}
