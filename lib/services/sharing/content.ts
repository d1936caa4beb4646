import type { Transaction } from 'sequelize';
import { select } from '@/lib/queue/statement';
import {
  CompanionObservationRow,
  CompanionRow,
  ContrastCurveRow,
  CoolingTableRow,
  type ShareRow,
  SurveyRow,
  TargetRow,
} from '@/models';
import { applyAdopted, loadAdopted } from '@/models/adopted-values';
import { digestOf } from '@/models/digest';

const TARGET_FIELDS = [
  'name',
  'foldedName',
  'otherNames',
  'gaiaDr3Id',
  'raDeg',
  'decDeg',
  'distancePc',
  'distanceErrorPc',
  'parallaxMas',
  'parallaxErrorMas',
  'hostMassMsun',
  'spectralType',
  'movingGroup',
  'attributes',
  'leftOutReason',
] as const;
const AGE_FIELDS = [
  'ageMyr',
  'ageLowerMyr',
  'ageUpperMyr',
  'ageMinMyr',
  'ageMaxMyr',
  'magnitudes',
] as const;
const CURVE_FIELDS = [
  'band',
  'epoch',
  'nSigma',
  'separationArcsec',
  'contrastMag',
  'coverage',
  'instrument',
  'reference',
  'digest',
] as const;
const COMPANION_FIELDS = [
  'name',
  'foldedName',
  'status',
  'massMjup',
  'massErrorLowerMjup',
  'massErrorUpperMjup',
  'semiMajorAxisAu',
  'semiMajorAxisErrorLowerAu',
  'semiMajorAxisErrorUpperAu',
  'probability',
  'reference',
] as const;
const OBSERVATION_FIELDS = [
  'observedOn',
  'separationArcsec',
  'separationErrorArcsec',
  'positionAngleDeg',
  'positionAngleErrorDeg',
  'band',
  'contrastMag',
  'contrastErrorMag',
  'source',
] as const;

/** Of a target's further columns, those that tell where the star is and how it was chosen. */
const OF_THE_SKY = ['refEpoch', 'pmRaMasYr', 'pmDecMasYr', 'selectedForCompanion'];

type Picked<Row, Field extends keyof Row> = Pick<Row, Field>;
const pick = <Row extends object, Field extends keyof Row>(
  row: Row,
  fields: readonly Field[],
): Picked<Row, Field> =>
  Object.fromEntries(fields.map((field) => [field, row[field]])) as Picked<Row, Field>;

export interface SharedMap {
  id: string;
  digest: string;
  checksum: string;
}

export interface SharedCompanion extends Picked<CompanionRow, (typeof COMPANION_FIELDS)[number]> {
  attributes: Record<string, unknown>;
  observations: Picked<CompanionObservationRow, (typeof OBSERVATION_FIELDS)[number]>[];
}

export interface SharedTarget extends Picked<TargetRow, (typeof TARGET_FIELDS)[number]> {
  ages: Partial<Picked<TargetRow, (typeof AGE_FIELDS)[number]>>;
  curves: Picked<ContrastCurveRow, (typeof CURVE_FIELDS)[number]>[];
  map: SharedMap | null;
  companions: SharedCompanion[];
}

/** What an offer holds, read at one moment, and nothing else of the owner's. */
export interface SharedContent {
  survey: Pick<
    SurveyRow,
    'slug' | 'name' | 'description' | 'band' | 'observedFrom' | 'observedTo' | 'mapSettings'
  >;
  targets: SharedTarget[];
  coolingTable: CoolingTableRow | null;
  /** Digest of all of it. */
  version: string;
}

const groupBy = <Row>(rows: Row[], keyOf: (row: Row) => string): Map<string, Row[]> => {
  const groups = new Map<string, Row[]>();
  for (const row of rows) {
    const list = groups.get(keyOf(row));
    if (list) list.push(row);
    else groups.set(keyOf(row), [row]);
  }
  return groups;
};

async function readMaps(
  { collaborationId }: SurveyRow,
  ids: string[],
  transaction: Transaction,
): Promise<Map<string, SharedMap>> {
  const maps = await select<SharedMap>(
    'select id, digest, checksum from completeness_map where collaboration_id = $1 and id = any($2::uuid[])',
    [collaborationId, ids],
    transaction,
  );
  return new Map(maps.map((map) => [map.id, map]));
}

/**
 * Reads what is offered of a survey. Ages and distances are those that its owner has adopted, since
 * the maps rest on them. Of maps alone no curve, age, magnitude, epoch or note goes along.
 *
 * @returns null where the survey is no more
 */
export async function collectContent(
  share: Pick<ShareRow, 'surveyId' | 'collaborationId' | 'scope'>,
  transaction: Transaction,
): Promise<SharedContent | null> {
  const { surveyId, collaborationId, scope } = share;
  if (surveyId === null || collaborationId === null) return null;
  const isWhole = scope === 'whole';
  const survey = await SurveyRow.findOne({ where: { id: surveyId, collaborationId }, transaction });
  if (!survey) return null;
  const targets = await TargetRow.findAll({
    where: { surveyId, collaborationId },
    order: [['foldedName', 'ASC']],
    transaction,
  });
  const adopted = await loadAdopted(collaborationId, transaction);
  for (const target of targets) applyAdopted(target, adopted);
  const targetId = targets.map(({ id }) => id);
  const maps = await readMaps(
    survey,
    targets.flatMap(({ mapId, mapState }) => (mapState === 'ready' && mapId ? [mapId] : [])),
    transaction,
  );
  const curves = isWhole
    ? await ContrastCurveRow.findAll({
        where: { targetId, replacedAt: null },
        order: [['digest', 'ASC']],
        transaction,
      })
    : [];
  const companions = await CompanionRow.findAll({
    where: { targetId },
    order: [['foldedName', 'ASC']],
    transaction,
  });
  const observations = isWhole
    ? await CompanionObservationRow.findAll({
        where: { companionId: companions.map(({ id }) => id) },
        order: [
          ['observedOn', 'ASC'],
          ['band', 'ASC'],
        ],
        transaction,
      })
    : [];
  const curvesOf = groupBy(curves, (curve) => curve.targetId);
  const companionsOf = groupBy(companions, (companion) => companion.targetId);
  const observationsOf = groupBy(observations, (one) => one.companionId);
  const skyOf = (attributes: Record<string, unknown>) =>
    Object.fromEntries(Object.entries(attributes).filter(([key]) => OF_THE_SKY.includes(key)));
  const shared = targets.map(
    (target): SharedTarget => ({
      ...pick(target, TARGET_FIELDS),
      attributes: isWhole ? target.attributes : skyOf(target.attributes),
      ages: isWhole ? pick(target, AGE_FIELDS) : {},
      curves: (curvesOf.get(target.id) ?? []).map((curve) => pick(curve, CURVE_FIELDS)),
      map: (target.mapState === 'ready' && maps.get(target.mapId ?? '')) || null,
      companions: (companionsOf.get(target.id) ?? []).map((companion) => ({
        ...pick(companion, COMPANION_FIELDS),
        attributes: isWhole ? companion.attributes : {},
        observations: (observationsOf.get(companion.id) ?? []).map((one) =>
          pick(one, OBSERVATION_FIELDS),
        ),
      })),
    }),
  );
  const { cooling } = survey.mapSettings;
  const coolingTable =
    isWhole && cooling.kind === 'table'
      ? await CoolingTableRow.findOne({
          where: { id: cooling.coolingTableId, collaborationId },
          transaction,
        })
      : null;
  const described = pick(survey, [
    'slug',
    'name',
    'description',
    'band',
    'observedFrom',
    'observedTo',
    'mapSettings',
  ] as const);
  const { slug, ...told } = described;
  const version = digestOf({
    ...told,
    coolingTable: coolingTable?.digest ?? null,
    targets: shared.map(({ map, ...target }) => ({ ...target, map: map?.checksum ?? null })),
  });
  return { survey: described, targets: shared, coolingTable, version };
}
