import { Op } from 'sequelize';
import type { Fault } from '@/lib/errors';
import { foldName, type TargetRecord } from '@/lib/formats';
import { ContrastCurveRow, TargetRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { proposeMatches } from '../star-sky';
import { KnownStars } from './known-stars';
import { type Plan, type PlanContext, type PlannedItem, summariseItems } from './plan';
import { storeTargets } from './store-targets';
import { fieldsOf, type TargetFields, type TargetStep } from './target-fields';

const isUnchanged = (row: TargetRow, fields: TargetFields) =>
  (Object.keys(fields) as (keyof TargetFields)[]).every(
    (key) => canonicalJson(row[key] ?? null) === canonicalJson(fields[key] ?? null),
  );

function describeRecord(record: TargetRecord): string {
  const parts: string[] = [];
  if (record.spectralType) parts.push(record.spectralType);
  if (record.distancePc !== null) parts.push(`${record.distancePc} pc`);
  else if (record.parallaxMas !== null) parts.push(`${(1000 / record.parallaxMas).toFixed(1)} pc`);
  if (record.ageMyr !== null) parts.push(`${record.ageMyr} Myr`);
  return parts.join(', ');
}

/** Matches each line to a known target and star; a star counts once, so it may not enter a survey twice. */
export async function planTargets(context: PlanContext, records: TargetRecord[]): Promise<Plan> {
  const { survey } = context;
  const [targets, known] = await Promise.all([
    TargetRow.findAll({ where: { surveyId: survey.id } }),
    KnownStars.load(survey.collaborationId),
  ]);
  const byName = new Map(targets.map((row) => [row.foldedName, row]));
  const byStar = new Map(targets.map((row) => [row.starId, row]));
  const items: PlannedItem[] = [];
  const faults: Fault[] = [];
  const steps: TargetStep[] = [];
  const claimed = new Map<string, TargetRecord>();
  for (const record of records) {
    const own = byName.get(foldName(record.name));
    // A target of this survey stays with its star, also where a person parted it from another.
    const found = own ? undefined : known.find(record);
    const star = own ? known.ofId(own.starId) : found?.star;
    const target = own ?? (star && byStar.get(star.id));
    const rival = star && claimed.get(star.id);
    if (rival) {
      faults.push({
        code: 'name-duplicate',
        line: record.line,
        column: 'name',
        message: `"${record.name}" is the same star as "${rival.name}" on line ${rival.line}; expected each star once`,
      });
    }
    if (star) claimed.set(star.id, record);
    if (star?.gaiaDr3Id && record.gaiaDr3Id && star.gaiaDr3Id !== record.gaiaDr3Id) {
      faults.push({
        code: 'inconsistent',
        line: record.line,
        column: 'gaia_dr3_id',
        found: record.gaiaDr3Id,
        expected: `${star.gaiaDr3Id}, by which "${star.name}" is known`,
      });
    }
    const unchanged = target !== undefined && isUnchanged(target, fieldsOf(record, target));
    steps.push({ record, target, star, found, isUnchanged: unchanged });
    const outcome = target ? (unchanged ? 'unchanged' : 'replaces') : star ? 'known-star' : 'new';
    items.push({ name: record.name, outcome, summary: describeRecord(record) });
  }
  const changed = steps.filter((step) => !step.isUnchanged);
  return {
    items,
    faults,
    notes: [],
    summary: summariseItems(items, 'target'),
    needsMaps: changed.some((step) => step.target !== undefined),
    apply: async (transaction, uploadId) => {
      await storeTargets({ context, known, steps: changed, uploadId }, transaction);
      await proposeMatches(survey.collaborationId, transaction);
      const replaced = changed.flatMap((step) => (step.target ? [step.target.id] : []));
      const curves = await ContrastCurveRow.findAll({
        where: { targetId: { [Op.in]: replaced }, replacedAt: null },
        attributes: ['targetId'],
        transaction,
      });
      await TargetRow.update(
        { mapState: 'waiting', mapFault: null },
        { where: { id: curves.map((curve) => curve.targetId) }, transaction },
      );
    },
  };
}
