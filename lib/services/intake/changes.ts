import type { Transaction } from 'sequelize';
import { CompanionRow, type SurveyRow, TargetRow, UploadChangeRow } from '@/models';

/** Why a target is left out that only a withdrawn file had brought. */
export const UPLOAD_WITHDRAWN = 'upload withdrawn';

type Plain = Record<string, unknown>;

/** What a file does not say of a target, or what has changes of its own. */
const notOfTheFile = ['id', 'collaborationId', 'surveyId', 'starId', 'starEvidence', 'createdAt'];
const ofTheMap = ['mapId', 'mapState', 'mapFault'];

function pick(row: { get(options: { plain: true }): unknown }, without: string[]): Plain {
  const plain = row.get({ plain: true }) as Plain;
  return Object.fromEntries(Object.entries(plain).filter(([key]) => !without.includes(key)));
}

/** The rows of a survey that a file may change, as they stand. */
export interface Standing {
  targets: Map<string, Plain>;
  maps: Map<string, Plain>;
  companions: Map<string, Plain>;
}

export async function takeStanding(survey: SurveyRow, transaction: Transaction): Promise<Standing> {
  const targets = await TargetRow.findAll({ where: { surveyId: survey.id }, transaction });
  const companions = await CompanionRow.findAll({
    where: { targetId: targets.map(({ id }) => id) },
    transaction,
  });
  return {
    targets: new Map(targets.map((row) => [row.id, pick(row, [...notOfTheFile, ...ofTheMap])])),
    maps: new Map(
      targets.map(({ id, mapId, mapState, mapFault }) => [id, { mapId, mapState, mapFault }]),
    ),
    companions: new Map(
      companions.map((row) => [
        row.id,
        pick(row, ['id', 'collaborationId', 'targetId', 'createdAt']),
      ]),
    ),
  };
}

/** Notes what a file has just changed, by the rows before and after. Curves keep their own record. */
export async function noteChanges(
  survey: SurveyRow,
  upload: { id: string; kind: string },
  before: Standing,
  transaction: Transaction,
): Promise<void> {
  const after = await takeStanding(survey, transaction);
  const isOfUpload = ([, row]: [string, Plain]) => row.uploadId === upload.id;
  const isOtherMap = ([id, { mapId }]: [string, Plain]) =>
    upload.kind === 'completeness-maps' && mapId !== (before.maps.get(id)?.mapId ?? null);
  const note = (itemKind: UploadChangeRow['itemKind'], old: Map<string, Plain>, ids: string[]) =>
    ids.map((itemId) => ({
      collaborationId: survey.collaborationId,
      uploadId: upload.id,
      itemKind,
      itemId,
      before: old.get(itemId) ?? null,
    }));
  const idsOf = (entries: [string, Plain][]) => entries.map(([id]) => id);
  await UploadChangeRow.bulkCreate(
    [
      ...note('target', before.targets, idsOf([...after.targets].filter(isOfUpload))),
      ...note('map', before.maps, idsOf([...after.maps].filter(isOtherMap))),
      ...note('companion', before.companions, idsOf([...after.companions].filter(isOfUpload))),
    ],
    { transaction },
  );
}
