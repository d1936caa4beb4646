import { Op } from 'sequelize';
import type { Fault } from '@/lib/errors';
import { foldName, type TargetRecord } from '@/lib/formats';
import { ContrastCurveRow, StarRow, TargetRow } from '@/models';
import { canonicalJson } from '@/models/digest';
import { type Plan, type PlanContext, type PlannedItem, summariseItems } from './plan';

/** Columns of the target table that a file states; everything else goes into `attributes`. */
function fieldsOf(record: TargetRecord, before?: TargetRow) {
  const { line, otherNames, ...rest } = record;
  return {
    name: record.name,
    foldedName: foldName(record.name),
    otherNames,
    gaiaDr3Id: record.gaiaDr3Id,
    raDeg: record.raDeg,
    decDeg: record.decDeg,
    distancePc: record.distancePc,
    distanceErrorPc: record.distanceErrorPc,
    parallaxMas: record.parallaxMas,
    parallaxErrorMas: record.parallaxErrorMas,
    ageMyr: record.ageMyr,
    ageLowerMyr: record.ageLowerMyr,
    ageUpperMyr: record.ageUpperMyr,
    ageMinMyr: record.ageMinMyr,
    ageMaxMyr: record.ageMaxMyr,
    hostMassMsun: record.hostMassMsun,
    spectralType: record.spectralType,
    movingGroup: record.movingGroup,
    magnitudes: record.magnitudes,
    attributes: {
      refEpoch: rest.refEpoch,
      pmRaMasYr: rest.pmRaMasYr,
      pmDecMasYr: rest.pmDecMasYr,
      hostMassErrorMsun: rest.hostMassErrorMsun,
      membershipProbability: rest.membershipProbability,
      multiplicity: rest.multiplicity,
      binarySemiMajorAxisAu: rest.binarySemiMajorAxisAu,
      binaryEccentricity: rest.binaryEccentricity,
      binaryMassRatio: rest.binaryMassRatio,
      debrisDisk: rest.debrisDisk,
      ...markOf(record, before),
      notes: rest.notes,
      reference: rest.reference,
    },
  };
}
type TargetFields = ReturnType<typeof fieldsOf>;

/** A file that says nothing of it leaves a person's mark as it is. */
function markOf({ selectedForCompanion }: TargetRecord, before?: TargetRow) {
  const mark = selectedForCompanion ?? before?.attributes.selectedForCompanion;
  return typeof mark === 'boolean' ? { selectedForCompanion: mark } : {};
}

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

/** Stars of the collaboration, found by Gaia number first and by any of a target's names second. */
class KnownStars {
  private readonly byGaia = new Map<string, StarRow>();
  private readonly byName = new Map<string, StarRow>();
  constructor(rows: StarRow[]) {
    for (const row of rows) this.add(row);
  }
  add(row: StarRow): void {
    if (row.gaiaDr3Id) this.byGaia.set(row.gaiaDr3Id, row);
    this.byName.set(row.foldedName, row);
  }
  find(record: TargetRecord): StarRow | undefined {
    const byNumber = record.gaiaDr3Id ? this.byGaia.get(record.gaiaDr3Id) : undefined;
    if (byNumber) return byNumber;
    for (const name of [record.name, ...record.otherNames]) {
      const row = this.byName.get(foldName(name));
      if (row) return row;
    }
    return undefined;
  }
}

interface Step {
  record: TargetRecord;
  target: TargetRow | undefined;
  star: StarRow | undefined;
  isUnchanged: boolean;
}

/** Matches each line to a known target and star; a star counts once, so it may not enter a survey twice. */
export async function planTargets(context: PlanContext, records: TargetRecord[]): Promise<Plan> {
  const { survey } = context;
  const [targets, stars] = await Promise.all([
    TargetRow.findAll({ where: { surveyId: survey.id } }),
    StarRow.findAll({ where: { collaborationId: survey.collaborationId } }),
  ]);
  const known = new KnownStars(stars);
  const byName = new Map(targets.map((row) => [row.foldedName, row]));
  const byStar = new Map(targets.map((row) => [row.starId, row]));
  const items: PlannedItem[] = [];
  const faults: Fault[] = [];
  const steps: Step[] = [];
  const claimed = new Map<string, TargetRecord>();
  for (const record of records) {
    const star = known.find(record);
    const target = byName.get(foldName(record.name)) ?? (star && byStar.get(star.id));
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
    steps.push({ record, target, star, isUnchanged: unchanged });
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
      for (const { record, target, star } of changed) {
        const fields = fieldsOf(record, target);
        const owner =
          star ??
          (await StarRow.create(
            {
              collaborationId: survey.collaborationId,
              name: record.name,
              foldedName: fields.foldedName,
              gaiaDr3Id: record.gaiaDr3Id,
            },
            { transaction },
          ));
        if (owner.gaiaDr3Id === null && record.gaiaDr3Id) {
          await owner.update({ gaiaDr3Id: record.gaiaDr3Id }, { transaction });
        }
        if (target) await target.update({ ...fields, uploadId }, { transaction });
        else {
          await TargetRow.create(
            {
              ...fields,
              collaborationId: survey.collaborationId,
              surveyId: survey.id,
              starId: owner.id,
              uploadId,
            },
            { transaction },
          );
        }
      }
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
