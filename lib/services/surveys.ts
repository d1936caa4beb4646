import { Op, QueryTypes, UniqueConstraintError } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import type {
  createSurveySchema,
  SurveyList,
  SurveyView,
  updateSurveySchema,
} from '@/lib/schemas/surveys';
import { database, inTransaction, JobRow, PersonRow, SurveyRow, TargetRow } from '@/models';
import { recordAudit } from './audit';
import { describeJob } from './jobs';
import { describeShared, refuseShared } from './sharing/shared-surveys';
import { currentYardstick, summariseMaps } from './survey-depth';

/** A survey's short name for addresses: "Halyard II" → "halyard-ii". */
export function slugOf(name: string): string {
  return name
    .normalize('NFKD')
    .replace(/[^\x20-\x7e]/g, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 39);
}

export const isLead = (actor: Actor, survey: SurveyRow) => survey.leadId === actor.personId;

/** The survey's row, or the same "no such survey" for absent and foreign. */
export async function findSurvey(actor: Actor, slug: string): Promise<SurveyRow> {
  demand(actor, 'read');
  const row = await SurveyRow.findOne({ where: { collaborationId: actor.collaborationId, slug } });
  if (!row) throw new NotFound('survey');
  return row;
}

interface Counts {
  survey_id: string;
  targets: string;
  shared: string;
  curves: string;
  none: string;
  waiting: string;
  ready: string;
  failed: string;
  confirmed: string;
  candidate: string;
  ambiguous: string;
  background: string;
}

async function countTargets(collaborationId: string): Promise<Map<string, Counts>> {
  const rows = await database().query<Counts>(
    `select t.survey_id,
       count(*) as targets,
       count(*) filter (where exists (
         select 1 from target o where o.star_id = t.star_id and o.survey_id <> t.survey_id)) as shared,
       count(*) filter (where t.map_state = 'none') as none,
       count(*) filter (where t.map_state = 'waiting') as waiting,
       count(*) filter (where t.map_state = 'ready') as ready,
       count(*) filter (where t.map_state = 'failed') as failed,
       coalesce(sum((select count(*) from contrast_curve c
         where c.target_id = t.id and c.replaced_at is null)), 0) as curves,
       coalesce(sum((select count(*) from companion c where c.target_id = t.id and c.status = 'confirmed')), 0) as confirmed,
       coalesce(sum((select count(*) from companion c where c.target_id = t.id and c.status = 'candidate')), 0) as candidate,
       coalesce(sum((select count(*) from companion c where c.target_id = t.id and c.status = 'ambiguous')), 0) as ambiguous,
       coalesce(sum((select count(*) from companion c where c.target_id = t.id and c.status = 'background')), 0) as background
     from target t where t.collaboration_id = $1 group by t.survey_id`,
    { bind: [collaborationId], type: QueryTypes.SELECT },
  );
  return new Map(rows.map((row) => [row.survey_id, row]));
}

/** The stars of each set of surveys, largest first, and the counts of stars and entries. */
async function countOverlaps(collaborationId: string) {
  const sets = await database().query<{ surveys: string[]; stars: string }>(
    `select surveys, count(*) as stars from (
       select t.star_id, array_agg(s.slug order by s.position) as surveys
       from target t join survey s on s.id = t.survey_id
       where t.collaboration_id = $1 and (s.archived_at is null or s.archived_at > now())
       group by t.star_id) held
     group by surveys order by count(*) desc, surveys`,
    { bind: [collaborationId], type: QueryTypes.SELECT },
  );
  const overlaps = sets.map((set) => ({ surveys: set.surveys, stars: Number(set.stars) }));
  return {
    overlaps,
    stars: overlaps.reduce((sum, set) => sum + set.stars, 0),
    entries: overlaps.reduce((sum, set) => sum + set.stars * set.surveys.length, 0),
  };
}

async function sensitivityOf(row: SurveyRow) {
  const targets = await TargetRow.findAll({
    attributes: ['mapId'],
    where: { surveyId: row.id, mapState: 'ready', leftOutReason: null, mapId: { [Op.ne]: null } },
  });
  if (targets.length === 0) return { depth: null, summedCompleteness: null };
  const { massMjup: mass, semiMajorAxisAu: axis } = row.mapSettings;
  const grid = {
    massMjup: logSpacedAxis(mass.min, mass.max, mass.count),
    semiMajorAxisAu: logSpacedAxis(axis.min, axis.max, axis.count),
  };
  const yardstick = await currentYardstick(row.collaborationId);
  const ids = targets.map((target) => target.mapId as string);
  const summaries = await summariseMaps(row.collaborationId, ids, yardstick, grid);
  const stars = new Float64Array(grid.semiMajorAxisAu.length);
  let summed = 0;
  for (const id of ids) {
    const summary = summaries.get(id);
    if (!summary) continue;
    summed += summary.probability;
    summary.profile.forEach((value, j) => {
      stars[j] += value;
    });
  }
  return {
    depth: { semiMajorAxisAu: [...grid.semiMajorAxisAu], stars: [...stars] },
    summedCompleteness: yardstick.isShared ? summed : null,
  };
}

async function describeSurvey(
  actor: Actor,
  row: SurveyRow,
  counts: Counts | undefined,
  look = { forNewer: false },
): Promise<SurveyView> {
  const [lead, job, sensitivity, shared] = await Promise.all([
    row.leadId ? PersonRow.findByPk(row.leadId) : null,
    JobRow.findOne({
      where: { surveyId: row.id, kind: 'compute-maps' },
      order: [['createdAt', 'DESC']],
    }),
    sensitivityOf(row),
    describeShared(actor, row, look),
  ]);
  const lookup = (key: keyof Counts) => Number(counts?.[key] ?? 0);
  const item = { isLead: isLead(actor, row) };
  const isOwn = row.shareId === null;
  return {
    id: row.id,
    slug: row.slug,
    name: row.name,
    band: row.band,
    description: row.description,
    observedFrom: row.observedFrom,
    observedTo: row.observedTo,
    lead: lead && { id: lead.id, name: lead.name },
    position: row.position,
    isArchived: row.archivedAt !== null && row.archivedAt <= new Date(),
    // Settings stored earlier lack the rules that came later.
    mapSettings: mapSettingsSchema.parse(row.mapSettings),
    targets: lookup('targets'),
    alsoInAnother: lookup('shared'),
    curves: lookup('curves'),
    maps: {
      ready: lookup('ready'),
      waiting: lookup('waiting'),
      failed: lookup('failed'),
      none: lookup('none'),
    },
    companions: {
      confirmed: lookup('confirmed'),
      candidate: lookup('candidate'),
      ambiguous: lookup('ambiguous'),
      background: lookup('background'),
    },
    ...sensitivity,
    mapJob: job && (await describeJob(job)),
    can: {
      change: isOwn && may(actor, 'change-survey', item),
      import: isOwn && may(actor, 'import', item),
      offer: isOwn && may(actor, 'offer-survey', item),
    },
    ...(shared && { shared }),
    createdAt: row.createdAt.toISOString(),
  };
}

/** Surveys of the collaboration, archived ones last, with the stars that they share. */
export async function listSurveys(actor: Actor): Promise<SurveyList> {
  demand(actor, 'read');
  const rows = await SurveyRow.findAll({
    where: { collaborationId: actor.collaborationId },
    order: [
      [database().literal('archived_at <= now() is true') as never, 'ASC'],
      ['position', 'ASC'],
    ],
  });
  const [counts, overlaps] = await Promise.all([
    countTargets(actor.collaborationId),
    countOverlaps(actor.collaborationId),
  ]);
  const surveys: SurveyView[] = [];
  for (const row of rows) surveys.push(await describeSurvey(actor, row, counts.get(row.id)));
  return { surveys, ...overlaps };
}

export async function getSurvey(actor: Actor, slug: string): Promise<SurveyView> {
  const row = await findSurvey(actor, slug);
  const counts = await countTargets(actor.collaborationId);
  return describeSurvey(actor, row, counts.get(row.id), { forNewer: true });
}

/** Only members lead surveys. */
async function demandMember(actor: Actor, personId: string): Promise<void> {
  const [member] = await database().query(
    'select 1 from member where collaboration_id = $1 and person_id = $2',
    { bind: [actor.collaborationId, personId], type: QueryTypes.SELECT },
  );
  if (!member) throw new NotFound('member');
}

export async function createSurvey(
  actor: Actor,
  input: z.infer<typeof createSurveySchema>,
): Promise<SurveyView> {
  demand(actor, 'create-survey');
  const slug = input.slug ?? slugOf(input.name);
  if (slug === '') throw new Conflict(`"${input.name}" gives no address; state a slug`);
  if (input.leadId) await demandMember(actor, input.leadId);
  try {
    await inTransaction(async (transaction) => {
      const position = await SurveyRow.count({
        where: { collaborationId: actor.collaborationId },
        transaction,
      });
      const row = await SurveyRow.create(
        {
          collaborationId: actor.collaborationId,
          slug,
          name: input.name,
          band: input.band,
          description: input.description,
          observedFrom: input.observedFrom,
          observedTo: input.observedTo,
          leadId: input.leadId ?? actor.personId,
          position,
          mapSettings: input.mapSettings,
        },
        { transaction },
      );
      await recordAudit(
        actor,
        'create-survey',
        { kind: 'survey', id: row.id },
        `added the survey ${row.name}`,
        transaction,
      );
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) {
      throw new Conflict(`A survey with the address "${slug}" is there already`);
    }
    throw error;
  }
  return getSurvey(actor, slug);
}

/** Changes what is given; new map settings make maps of a new digest at the next computation. */
export async function updateSurvey(
  actor: Actor,
  slug: string,
  input: z.infer<typeof updateSurveySchema>,
): Promise<SurveyView> {
  const row = await findSurvey(actor, slug);
  demand(actor, 'change-survey', { isLead: isLead(actor, row) });
  await refuseShared(row);
  const { isArchived, ...fields } = input;
  if (fields.leadId) await demandMember(actor, fields.leadId);
  await inTransaction(async (transaction) => {
    const archivedAt = isArchived === undefined ? row.archivedAt : isArchived ? new Date() : null;
    await row.update({ ...fields, archivedAt }, { transaction });
    await recordAudit(
      actor,
      'change-survey',
      { kind: 'survey', id: row.id },
      `changed the survey ${row.name}`,
      transaction,
    );
  });
  return getSurvey(actor, slug);
}
