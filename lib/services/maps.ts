import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { enqueueMaps } from '@/lib/queue/enqueue';
import { idSchema } from '@/lib/schemas/common';
import type { JobView } from '@/lib/schemas/jobs';
import type { MapState, MapStore, SurveyMaps } from '@/lib/schemas/map-states';
import type { MapView } from '@/lib/schemas/sensitivity';
import { CompletenessMapRow, inTransaction, JobRow, SurveyRow, TargetRow } from '@/models';
import { readMapStates } from '@/models/map-standings';
import { unpackMap } from '@/models/map-values';
import { recordAudit } from './audit';
import { describeJob } from './jobs';
import { notArchived } from './sharing/archived';
import { findSurvey, isLead } from './surveys';

async function findMap(actor: Actor, id: string): Promise<CompletenessMapRow> {
  demand(actor, 'read');
  const isId = idSchema.safeParse(id).success;
  const row = isId
    ? await CompletenessMapRow.findOne({ where: { id, collaborationId: actor.collaborationId } })
    : null;
  if (!row) throw new NotFound('completeness map');
  return row;
}

/** A stored map with its axes and with what it was made from. */
export async function getMap(actor: Actor, id: string): Promise<MapView> {
  const row = await findMap(actor, id);
  const values = unpackMap(row.nodeValues);
  const columns = row.semiMajorAxisAu.length;
  return {
    id: row.id,
    digest: row.digest,
    origin: row.origin,
    engineVersion: row.engineVersion,
    checksum: row.checksum,
    massMjup: row.massMjup,
    semiMajorAxisAu: row.semiMajorAxisAu,
    completeness: row.massMjup.map((_, i) => [...values.subarray(i * columns, (i + 1) * columns)]),
    report: row.report,
    inputs: row.inputs,
  };
}

/** The stored bytes: uint16 little-endian, row-major [mass, semi-major axis], and their digest. */
export async function getMapBytes(actor: Actor, id: string) {
  const row = await findMap(actor, id);
  return {
    bytes: row.nodeValues,
    digest: row.digest,
    shape: [row.massMjup.length, row.semiMajorAxisAu.length] as const,
  };
}

/** The state of each target's map, and the newest computation. */
export async function listSurveyMaps(actor: Actor, slug: string): Promise<SurveyMaps> {
  const survey = await findSurvey(actor, slug);
  const [targets, states, job] = await Promise.all([
    TargetRow.findAll({
      where: { surveyId: survey.id },
      include: [{ model: CompletenessMapRow, as: 'map', attributes: ['digest', 'checksum'] }],
      order: [['foldedName', 'ASC']],
    }),
    readMapStates([survey]),
    JobRow.findOne({
      where: { surveyId: survey.id, kind: 'compute-maps' },
      order: [['createdAt', 'DESC']],
    }),
  ]);
  const stateOf = new Map(states.get(survey.id)?.map((state) => [state.targetId, state]));
  return {
    job: job && (await describeJob(job)),
    maps: targets.map((target) => {
      const map = (target as TargetRow & { map: CompletenessMapRow | null }).map;
      const { standing = 'none', reason = null, words = null } = stateOf.get(target.id) ?? {};
      return {
        target: target.name,
        targetId: target.id,
        mapId: target.mapId,
        state: target.mapState,
        fault: target.mapFault,
        digest: map?.digest ?? null,
        checksum: map?.checksum ?? null,
        standing,
        reason,
        words,
      };
    }),
  };
}

/** Starts the computation of the survey's maps that are missing or stale; current ones stay. */
export async function startMaps(actor: Actor, slug: string): Promise<JobView> {
  const survey = await findSurvey(actor, slug);
  demand(actor, 'import', { isLead: isLead(actor, survey) });
  const jobId = await inTransaction(async (transaction) => {
    const withCurve = await TargetRow.count({
      where: { surveyId: survey.id },
      include: [{ association: 'curves', where: { replacedAt: null }, required: true }],
      distinct: true,
      transaction,
    });
    if (withCurve === 0) throw new Conflict('No target of this survey has a contrast curve yet');
    const id = await enqueueMaps(transaction, {
      collaborationId: actor.collaborationId,
      surveyId: survey.id,
      requestedBy: actor.personId,
    });
    await recordAudit(
      actor,
      'import',
      { kind: 'survey', id: survey.id },
      `started the maps of ${survey.name}`,
      transaction,
    );
    return id;
  });
  const job = await JobRow.findByPk(jobId);
  if (!job) throw new NotFound('job');
  return describeJob(job);
}

/** How the maps of every survey stand, archived ones left out. */
export async function readMapStore(actor: Actor): Promise<MapStore> {
  demand(actor, 'read');
  const rows = await SurveyRow.findAll({
    where: { collaborationId: actor.collaborationId, ...notArchived() },
    order: [['position', 'ASC']],
  });
  const statesOf = await readMapStates(rows);
  const surveys: MapStore['surveys'] = [];
  for (const row of rows) {
    const states = statesOf.get(row.id) ?? [];
    const count = (standing: MapState['standing']) =>
      states.filter((state) => state.standing === standing).length;
    const reasons = new Map<NonNullable<MapState['reason']>, number>();
    for (const { reason } of states) {
      if (reason) reasons.set(reason, (reasons.get(reason) ?? 0) + 1);
    }
    surveys.push({
      slug: row.slug,
      name: row.name,
      position: row.position,
      standings: {
        current: count('current'),
        stale: count('stale'),
        missing: count('missing'),
        failed: count('failed'),
        uploaded: count('uploaded'),
        none: count('none'),
      },
      reasons: [...reasons].map(([reason, maps]) => ({ reason, maps })),
      canRefresh: may(actor, 'import', { isLead: isLead(actor, row) }),
    });
  }
  return { surveys };
}
