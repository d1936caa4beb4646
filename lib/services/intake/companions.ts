import { type CompanionRecord, foldName } from '@/lib/formats';
import { CompanionRow, ContrastCurveRow, TargetRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { type Plan, type PlanContext, type PlannedItem, summariseItems } from './plan';
import { TargetNames } from './target-names';

const fieldsOf = (record: CompanionRecord) => ({
  name: record.companion,
  foldedName: foldName(record.companion),
  status: record.status,
  massMjup: record.massMjup,
  massErrorLowerMjup: record.massErrorLowerMjup,
  massErrorUpperMjup: record.massErrorUpperMjup,
  semiMajorAxisAu: record.semiMajorAxisAu,
  semiMajorAxisErrorLowerAu: record.semiMajorAxisErrorLowerAu,
  semiMajorAxisErrorUpperAu: record.semiMajorAxisErrorUpperAu,
  probability: record.probability,
  reference: record.reference,
  attributes: {
    projectedSeparationAu: record.projectedSeparationAu,
    separationArcsec: record.separationArcsec,
    positionAngleDeg: record.positionAngleDeg,
    contrastMag: record.contrastMag,
    band: record.band,
    epoch: record.epoch,
    eccentricity: record.eccentricity,
    commonProperMotion: record.commonProperMotion,
  },
});
type Fields = ReturnType<typeof fieldsOf>;

const isUnchanged = (row: CompanionRow, fields: Fields) =>
  (Object.keys(fields) as (keyof Fields)[]).every(
    (key) => canonicalJson(row[key] ?? null) === canonicalJson(fields[key] ?? null),
  );

/** One row a companion; a later file replaces what an earlier one said of it. */
export async function planCompanions(
  context: PlanContext,
  records: CompanionRecord[],
): Promise<Plan> {
  const { survey } = context;
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  const names = new TargetNames(targets);
  const rows = await CompanionRow.findAll({
    where: { targetId: targets.map((target) => target.id) },
  });
  const known = new Map(rows.map((row) => [`${row.targetId}|${row.foldedName}`, row]));
  const items: PlannedItem[] = [];
  const steps: { record: CompanionRecord; target: TargetRow; row: CompanionRow | undefined }[] = [];
  for (const record of records) {
    const target = names.find(record.target);
    if (!target) continue;
    const label = `${target.name} ${record.companion}`;
    const row = known.get(`${target.id}|${foldName(record.companion)}`);
    const unchanged = row !== undefined && isUnchanged(row, fieldsOf(record));
    const place =
      record.massMjup === null || record.semiMajorAxisAu === null
        ? ''
        : `, ${record.massMjup} Mjup at ${record.semiMajorAxisAu} AU`;
    items.push({
      name: label,
      outcome: row ? (unchanged ? 'unchanged' : 'replaces') : 'new',
      summary: `${record.status}${place}`,
    });
    if (!unchanged) steps.push({ record, target, row });
  }
  // Where candidates cut the curves, the maps of their stars follow them.
  const needsMaps = survey.mapSettings.candidates === 'cut' && steps.length > 0;
  return {
    items,
    faults: [],
    notes: [],
    summary:
      records.length === 0
        ? 'No companions: a table without rows states zero detections'
        : summariseItems(items, 'companion'),
    needsMaps,
    apply: async (transaction, uploadId) => {
      for (const { record, target, row } of steps) {
        const fields = { ...fieldsOf(record), uploadId };
        if (row) await row.update(fields, { transaction });
        else {
          await CompanionRow.create(
            { ...fields, collaborationId: survey.collaborationId, targetId: target.id },
            { transaction },
          );
        }
      }
      if (!needsMaps) return;
      const curves = await ContrastCurveRow.findAll({
        where: { targetId: steps.map(({ target }) => target.id), replacedAt: null },
        attributes: ['targetId'],
        transaction,
      });
      await TargetRow.update(
        { mapState: 'waiting', mapFault: null },
        { where: { id: curves.map(({ targetId }) => targetId) }, transaction },
      );
    },
  };
}
