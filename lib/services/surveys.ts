import { QueryTypes, UniqueConstraintError } from 'sequelize';
import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { Conflict, InputError, NotFound } from '@/lib/errors';
import { mapSettingsSchema } from '@/lib/schemas/sensitivity';
import {
  areYearsInOrder,
  type createSurveySchema,
  LAST_YEAR,
  type MapSettings,
  type SurveyList,
  type SurveyView,
  type updateSurveySchema,
} from '@/lib/schemas/surveys';
import { database, inTransaction, SurveyRow } from '@/models';
import { recordAudit } from './audit';
import { isArchived } from './sharing/archived';
import { describeShared, refuseShared } from './sharing/shared-surveys';
import { gridOfSettings, summariseMaps, type Yardstick } from './survey-depth';
import { readSurveyFacts, type SurveyFacts } from './survey-facts';
import { limitAlone } from './survey-limit';
import { together } from './together';

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

type Sensitivity = Pick<SurveyView, 'depth' | 'summedCompleteness'>;
const NOTHING_SEEN: Sensitivity = { depth: null, summedCompleteness: null };

async function sensitivityOf(
  row: SurveyRow,
  ids: string[],
  yardstick: Yardstick,
): Promise<Sensitivity> {
  if (ids.length === 0) return NOTHING_SEEN;
  const grid = gridOfSettings(row.mapSettings as MapSettings);
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
    summedCompleteness: yardstick.isFlat ? null : summed,
  };
}

type SeenFacts = SurveyFacts & { sensitivityOf: Map<string, Sensitivity> };

/** What hangs on surveys, and what their maps see. */
async function readFacts(collaborationId: string, rows: SurveyRow[]): Promise<SeenFacts> {
  const facts = await readSurveyFacts(collaborationId, rows);
  const seen = await Promise.all(
    rows.map(async (row): Promise<[string, Sensitivity]> => {
      const ids = facts.countsOf.get(row.id)?.mapIds ?? [];
      return [row.id, await sensitivityOf(row, ids, facts.yardstick)];
    }),
  );
  return { ...facts, sensitivityOf: new Map(seen) };
}

async function describeSurvey(
  actor: Actor,
  row: SurveyRow,
  facts: SeenFacts,
  look = { forNewer: false },
): Promise<SurveyView> {
  const counts = facts.countsOf.get(row.id);
  const share = row.shareId === null ? undefined : facts.shareOf.get(row.shareId);
  const sensitivity = facts.sensitivityOf.get(row.id) ?? NOTHING_SEEN;
  const shared = share && (await describeShared(actor, share, look));
  const lead = row.leadId === null ? undefined : facts.leadOf.get(row.leadId);
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
    lead: lead ? { id: lead.id, name: lead.name } : null,
    position: row.position,
    isArchived: isArchived(row),
    // Settings stored earlier lack the rules that came later.
    mapSettings: mapSettingsSchema.parse(row.mapSettings),
    targets: counts?.targets ?? 0,
    alsoInAnother: counts?.shared ?? 0,
    curves: counts?.curves ?? 0,
    maps: {
      ready: counts?.ready ?? 0,
      waiting: counts?.waiting ?? 0,
      failed: counts?.failed ?? 0,
      none: counts?.none ?? 0,
      stale: facts.staleOf.get(row.id) ?? null,
    },
    companions: {
      confirmed: counts?.confirmed ?? 0,
      candidate: counts?.candidate ?? 0,
      ambiguous: counts?.ambiguous ?? 0,
      background: counts?.background ?? 0,
    },
    ...sensitivity,
    yardstick: facts.yardstick.isFlat ? null : facts.yardstick.view,
    mapJob: facts.jobOf.get(row.id) ?? null,
    can: {
      change: isOwn && may(actor, 'change-survey', item),
      import: isOwn && may(actor, 'import', item),
      offer: isOwn && may(actor, 'offer-survey', item),
    },
    ...(shared && { shared }),
    createdAt: row.createdAt.toISOString(),
  };
}

async function readAllSurveys(collaborationId: string) {
  const rows = await SurveyRow.findAll({
    where: { collaborationId },
    order: [
      [database().literal('archived_at <= now() is true') as never, 'ASC'],
      ['position', 'ASC'],
    ],
  });
  const [facts, overlaps] = await Promise.all([
    readFacts(collaborationId, rows),
    countOverlaps(collaborationId),
  ]);
  return { rows, facts, overlaps };
}

/** Surveys of the collaboration, archived ones last, with the stars that they share. */
export async function listSurveys(actor: Actor): Promise<SurveyList> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const { rows, facts, overlaps } = await together(`surveys ${collaborationId}`, () =>
    readAllSurveys(collaborationId),
  );
  const surveys = await Promise.all(rows.map((row) => describeSurvey(actor, row, facts)));
  return { surveys, ...overlaps };
}

export async function getSurvey(actor: Actor, slug: string): Promise<SurveyView> {
  const row = await findSurvey(actor, slug);
  const facts = await readFacts(actor.collaborationId, [row]);
  const [survey, alone] = await Promise.all([
    describeSurvey(actor, row, facts, { forNewer: true }),
    limitAlone(row, facts.yardstick),
  ]);
  return { ...survey, alone };
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

/** One year that is given is held against the other that is stored. */
function refuseYears(years: Pick<SurveyRow, 'observedFrom' | 'observedTo'>): void {
  if (areYearsInOrder(years)) return;
  throw new InputError({
    code: 'inconsistent',
    item: 'observedTo',
    found: `${years.observedFrom} to ${years.observedTo}`,
    expected: LAST_YEAR,
  });
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
  const { isArchived: isPutAway, ...fields } = input;
  if (fields.leadId) await demandMember(actor, fields.leadId);
  const { observedFrom, observedTo } = fields;
  if (observedFrom !== undefined || observedTo !== undefined) {
    refuseYears({
      observedFrom: observedFrom === undefined ? row.observedFrom : observedFrom,
      observedTo: observedTo === undefined ? row.observedTo : observedTo,
    });
  }
  await inTransaction(async (transaction) => {
    const archivedAt = isPutAway === undefined ? row.archivedAt : isPutAway ? new Date() : null;
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
