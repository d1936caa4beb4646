import { Op, type Transaction } from 'sequelize';
import {
  CompanionRow,
  CompanionVerdictRow,
  CompletenessMapRow,
  ContrastCurveRow,
  type SurveyRow,
  TargetRow,
  UploadChangeRow,
  UploadRow,
} from '@/models';
import { UPLOAD_WITHDRAWN } from './changes';

/** What withdrawing a file does, row by row. */
export interface Withdrawal {
  words: { leftOut: string[]; goBack: string[]; end: string[]; stay: string[] };
  /** Of every row that the file touched. */
  targetIds: Set<string>;
  steps: ((transaction: Transaction, personId: string) => Promise<void>)[];
  /** Targets whose curves or facts change. */
  remap: Set<string>;
}

interface Context {
  upload: UploadRow;
  survey: SurveyRow;
  targets: Map<string, TargetRow>;
  plan: Withdrawal;
  transaction: Transaction;
}

/** The next file that changed the same row and still stands. */
async function laterChange(change: UploadChangeRow, transaction: Transaction) {
  const { itemKind, itemId, id } = change;
  const later = await UploadChangeRow.findAll({
    where: { itemKind, itemId, id: { [Op.gt]: id } },
    order: [['id', 'ASC']],
    transaction,
  });
  if (later.length === 0) return null;
  const standing = await UploadRow.findAll({
    attributes: ['id'],
    where: { id: later.map(({ uploadId }) => uploadId), state: 'stored' },
    transaction,
  });
  const ids = new Set(standing.map(({ id: uploadId }) => uploadId));
  return later.find(({ uploadId }) => ids.has(uploadId)) ?? null;
}

function planTarget(change: UploadChangeRow, target: TargetRow, { plan }: Context): void {
  const { before } = change;
  if (before === null) {
    plan.words.leftOut.push(target.name);
    plan.steps.push(async (transaction) => {
      const leftOutReason = target.leftOutReason ?? UPLOAD_WITHDRAWN;
      await target.update({ leftOutReason }, { transaction });
    });
    return;
  }
  plan.remap.add(target.id);
  plan.words.goBack.push(target.name);
  plan.steps.push(async (transaction) => {
    const { attributes, leftOutReason, ...fields } = before as { attributes?: object } & Record<
      string,
      unknown
    >;
    // A mark and a reason to leave a star out are a person's, and not of the file.
    const { selectedForCompanion } = target.attributes;
    const mark = typeof selectedForCompanion === 'boolean' ? { selectedForCompanion } : {};
    const wasWithdrawn = leftOutReason === UPLOAD_WITHDRAWN && target.leftOutReason === null;
    await target.update(
      {
        ...fields,
        attributes: { ...attributes, ...mark },
        ...(wasWithdrawn && { leftOutReason: UPLOAD_WITHDRAWN }),
      },
      { transaction },
    );
  });
}

function planMap({ before }: UploadChangeRow, target: TargetRow, { plan }: Context): void {
  const mapId = (before?.mapId ?? null) as string | null;
  (mapId === null ? plan.words.end : plan.words.goBack).push(`map of ${target.name}`);
  plan.steps.push(async (transaction) => {
    const mapState = mapId === null ? 'none' : 'ready';
    await target.update({ mapId, mapState, mapFault: null }, { transaction });
  });
}

async function planCompanion(change: UploadChangeRow, context: Context): Promise<void> {
  const { plan, targets, survey, transaction } = context;
  const companion = await CompanionRow.findByPk(change.itemId, { transaction });
  if (!companion) return;
  const target = targets.get(companion.targetId);
  const label = `${target?.name ?? ''} ${companion.name}`.trim();
  plan.targetIds.add(companion.targetId);
  const verdicts = await CompanionVerdictRow.findAll({
    where: { companionId: companion.id },
    order: [['number', 'DESC']],
    transaction,
  });
  if (verdicts.some(({ uploadId, isProposal }) => uploadId === null && !isProposal)) {
    plan.words.stay.push(`${label}, vetted by a person`);
    return;
  }
  if (survey.mapSettings.candidates === 'cut') plan.remap.add(companion.targetId);
  const { before } = change;
  if (before === null) {
    plan.words.end.push(label);
    plan.steps.push((inside) => companion.destroy({ transaction: inside }));
    return;
  }
  plan.words.goBack.push(label);
  plan.steps.push(async (inside, personId) => {
    await companion.update(before as Partial<CompanionRow['dataValues']>, { transaction: inside });
    const { status, probability, massMjup, semiMajorAxisAu } = companion;
    await CompanionVerdictRow.create(
      {
        companionId: companion.id,
        collaborationId: companion.collaborationId,
        number: (verdicts[0]?.number ?? 0) + 1,
        ...{ status, probability, massMjup, semiMajorAxisAu },
        massErrorLowerMjup: companion.massErrorLowerMjup,
        massErrorUpperMjup: companion.massErrorUpperMjup,
        massFrom: massMjup === null ? null : 'file',
        semiMajorAxisErrorLowerAu: companion.semiMajorAxisErrorLowerAu,
        semiMajorAxisErrorUpperAu: companion.semiMajorAxisErrorUpperAu,
        semiMajorAxisFrom: semiMajorAxisAu === null ? null : 'file',
        reason: 'The file that said otherwise is withdrawn',
        uploadId: companion.uploadId,
        createdBy: personId,
      },
      { transaction: inside },
    );
  });
}

const keyOf = ({ targetId, band, epoch }: ContrastCurveRow) => `${targetId}|${band}|${epoch ?? ''}`;

async function planCurves({ upload, targets, plan, transaction }: Context): Promise<void> {
  const current = await ContrastCurveRow.findAll({
    where: { uploadId: upload.id, replacedAt: null },
    transaction,
  });
  if (current.length === 0) return;
  const older = await ContrastCurveRow.findAll({
    where: {
      targetId: current.map(({ targetId }) => targetId),
      replacedAt: { [Op.ne]: null },
    },
    order: [['createdAt', 'DESC']],
    transaction,
  });
  const withdrawn = await UploadRow.findAll({
    attributes: ['id'],
    where: { id: older.flatMap(({ uploadId }) => uploadId ?? []), state: 'withdrawn' },
    transaction,
  });
  const gone = new Set([upload.id, ...withdrawn.map(({ id }) => id)]);
  const back: ContrastCurveRow[] = [];
  for (const curve of current) {
    const before = older.find(
      (one) => keyOf(one) === keyOf(curve) && !(one.uploadId && gone.has(one.uploadId)),
    );
    const label = `curve of ${targets.get(curve.targetId)?.name}, ${curve.band}`;
    plan.targetIds.add(curve.targetId);
    plan.remap.add(curve.targetId);
    (before ? plan.words.goBack : plan.words.end).push(label);
    if (before) back.push(before);
  }
  plan.steps.unshift(async (inside) => {
    await ContrastCurveRow.update(
      { replacedAt: new Date() },
      { where: { id: current.map(({ id }) => id) }, transaction: inside },
    );
    await ContrastCurveRow.update(
      { replacedAt: null },
      { where: { id: back.map(({ id }) => id) }, transaction: inside },
    );
  });
}

/** Finds what would change, changing nothing. */
export async function planWithdrawal(
  upload: UploadRow,
  survey: SurveyRow,
  transaction: Transaction,
): Promise<Withdrawal> {
  const rows = await TargetRow.findAll({ where: { surveyId: survey.id }, transaction });
  const plan: Withdrawal = {
    words: { leftOut: [], goBack: [], end: [], stay: [] },
    targetIds: new Set(),
    steps: [],
    remap: new Set(),
  };
  const targets = new Map(rows.map((row) => [row.id, row]));
  const context = { upload, survey, targets, plan, transaction };
  const changes = await UploadChangeRow.findAll({
    where: { uploadId: upload.id },
    order: [['id', 'ASC']],
    transaction,
  });
  for (const change of changes) {
    const target = targets.get(change.itemId);
    if (target) plan.targetIds.add(target.id);
    const later = await laterChange(change, transaction);
    if (later) {
      plan.words.stay.push(`${target?.name ?? 'a companion'}, changed by a later file`);
      // What that file replaced is now what stood before this one.
      plan.steps.push(async (inside) => {
        await later.update({ before: change.before }, { transaction: inside });
      });
    } else if (change.itemKind === 'companion') await planCompanion(change, context);
    else if (target && change.itemKind === 'target') planTarget(change, target, context);
    else if (target) planMap(change, target, context);
  }
  await planCurves(context);
  return plan;
}

/** Does what was planned; tells whether maps have to be computed. */
export async function applyWithdrawal(
  { steps, remap }: Withdrawal,
  personId: string,
  transaction: Transaction,
): Promise<boolean> {
  for (const step of steps) await step(transaction, personId);
  const touched = [...remap];
  const curves = await ContrastCurveRow.findAll({
    where: { targetId: touched, replacedAt: null },
    attributes: ['targetId'],
    transaction,
  });
  const withCurve = new Set(curves.map(({ targetId }) => targetId));
  const bare = await TargetRow.findAll({
    where: { id: touched.filter((id) => !withCurve.has(id)) },
    transaction,
  });
  const computed = await CompletenessMapRow.findAll({
    attributes: ['id'],
    where: { id: bare.flatMap(({ mapId }) => mapId ?? []), origin: 'computed' },
    transaction,
  });
  const mapIds = new Set(computed.map(({ id }) => id));
  const lost = bare.filter(({ mapId, mapState }) =>
    mapId === null ? mapState !== 'none' : mapIds.has(mapId),
  );
  await TargetRow.update(
    { mapState: 'waiting', mapFault: null },
    { where: { id: [...withCurve] }, transaction },
  );
  // A map that came from a curve ends with it.
  await TargetRow.update(
    { mapId: null, mapState: 'none', mapFault: null },
    { where: { id: lost.map(({ id }) => id) }, transaction },
  );
  return withCurve.size > 0;
}
