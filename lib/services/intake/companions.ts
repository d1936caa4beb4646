import { type CompanionRecord, foldName, type Note } from '@/lib/formats';
import {
  CompanionObservationRow,
  CompanionRow,
  CompanionVerdictRow,
  ContrastCurveRow,
  TargetRow,
} from '@/models';
import { canonicalJson } from '@/models/digest';
import { dayOf, keepFromFile } from '../candidates/from-file';
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
    // Files that state no errors must compare equal with rows of before there were such columns.
    ...(record.separationErrorArcsec !== null && {
      separationErrorArcsec: record.separationErrorArcsec,
    }),
    ...(record.positionAngleErrorDeg !== null && {
      positionAngleErrorDeg: record.positionAngleErrorDeg,
    }),
    ...(record.contrastErrorMag !== null && { contrastErrorMag: record.contrastErrorMag }),
  },
});
type Fields = ReturnType<typeof fieldsOf>;

const isUnchanged = (row: CompanionRow, fields: Fields) =>
  (Object.keys(fields) as (keyof Fields)[]).every(
    (key) => canonicalJson(row[key] ?? null) === canonicalJson(fields[key] ?? null),
  );

const epochKey = (companionId: string, day: string | null, band: string | null) =>
  [companionId, day, band].join(' ');

async function knownEpochs(rows: CompanionRow[]): Promise<Set<string>> {
  const there = await CompanionObservationRow.findAll({
    attributes: ['companionId', 'observedOn', 'band'],
    where: { companionId: rows.map(({ id }) => id) },
  });
  return new Set(there.map((one) => epochKey(one.companionId, one.observedOn, one.band)));
}

/** Says so where a file states something else than a person decided: nothing is overruled unseen. */
async function noteOverruled(
  steps: { record: CompanionRecord; target: TargetRow; row: CompanionRow | undefined }[],
): Promise<Note[]> {
  const changed = steps.filter(({ row, record }) => row && row.status !== record.status);
  const decided = await CompanionVerdictRow.findAll({
    attributes: ['companionId'],
    where: {
      companionId: changed.map(({ row }) => row?.id ?? ''),
      uploadId: null,
      isProposal: false,
    },
  });
  const ids = new Set(decided.map(({ companionId }) => companionId));
  return changed.flatMap(({ row, record, target }) => {
    if (!row || !ids.has(row.id)) return [];
    const message = `${target.name} ${record.companion}: ${row.status} by a verdict, ${record.status} by this file; the history keeps both`;
    return [{ code: 'verdict-overruled', level: 'warning' as const, line: record.line, message }];
  });
}

/** One row a companion; a later file replaces what an earlier one said of it. */
export async function planCompanions(
  context: PlanContext,
  records: CompanionRecord[],
): Promise<Plan> {
  const { survey } = context;
  const { personId } = context.actor;
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id } });
  const names = new TargetNames(targets);
  const rows = await CompanionRow.findAll({
    where: { targetId: targets.map((target) => target.id) },
  });
  const known = new Map(rows.map((row) => [`${row.targetId}|${row.foldedName}`, row]));
  const seen = await knownEpochs(rows);
  const items: PlannedItem[] = [];
  const steps: { record: CompanionRecord; target: TargetRow; row: CompanionRow | undefined }[] = [];
  for (const record of records) {
    const target = names.find(record.target);
    if (!target) continue;
    const label = `${target.name} ${record.companion}`;
    const row = known.get(`${target.id}|${foldName(record.companion)}`);
    const hasNewEpoch = (record.furtherEpochs ?? []).some(
      (further) => !seen.has(epochKey(row?.id ?? '', dayOf(further.epoch ?? ''), further.band)),
    );
    const unchanged = row !== undefined && isUnchanged(row, fieldsOf(record)) && !hasNewEpoch;
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
    notes: await noteOverruled(steps),
    summary:
      records.length === 0
        ? 'No companions: a table without rows states zero detections'
        : summariseItems(items, 'companion'),
    needsMaps,
    apply: async (transaction, uploadId) => {
      for (const { record, target, row } of steps) {
        const fields = { ...fieldsOf(record), uploadId };
        const kept = row
          ? await row.update(fields, { transaction })
          : await CompanionRow.create(
              { ...fields, collaborationId: survey.collaborationId, targetId: target.id },
              { transaction },
            );
        await keepFromFile(kept, record, { uploadId, personId }, transaction);
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
