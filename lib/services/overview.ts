import { Op, QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { may } from '@/lib/access/permissions';
import { JUPITER_MASSES_PER_SUN } from '@/lib/quantities/constants';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import type { JobView } from '@/lib/schemas/jobs';
import type { Overview } from '@/lib/schemas/overview';
import type { SurveyView } from '@/lib/schemas/surveys';
import { CollaborationRow, database, JobRow, MemberRow } from '@/models';
import { newsFor } from './activity-kinds';
import { listAnalyses } from './analyses';
import { describeJobs } from './jobs';
import { leadOf } from './lead-analysis';
import { describeSteps, type HistoryRun } from './limit-history';
import { needsTwoPeople } from './settings';
import { sharingNotices } from './sharing/notices';
import { listSurveys } from './surveys';
import { together } from './together';

const LOG_LENGTH = 12;

/** Finished runs of an analysis, oldest first, with what their labels are made from. */
function readHistory(analysisId: string): Promise<HistoryRun[]> {
  return database().query<HistoryRun>(
    `select finished_at as at, number as run, recipe,
       (x.answer->>'limit')::float8 as "limit", (x.zero->>'limit')::float8 as "zeroLimit",
       x.stars, jsonb_array_length(x.counted) as detections, y.population, y.cooling,
       y."engineVersion", inputs_digest as "inputsDigest"
     from run
       cross join lateral jsonb_to_record(result) as x(
         stars int, answer jsonb, zero jsonb, counted jsonb)
       left join lateral jsonb_to_record(inputs) as y(
         population jsonb, cooling text, "engineVersion" text) on true
     where analysis_id = $1 and result is not null order by number`,
    { bind: [analysisId], type: QueryTypes.SELECT },
  );
}

type Waiting = Overview['waiting'];

function failedMaps(slug: string, surveys: SurveyView[]): Waiting {
  return surveys
    .filter(({ isArchived, maps }) => !isArchived && maps.failed > 0)
    .map((survey) => ({
      fact: survey.maps.failed === 1 ? '1 map failed' : `${survey.maps.failed} maps failed`,
      detail: `${survey.name}: each target says why`,
      verb: 'Look',
      address: `/${slug}/surveys/${survey.slug}`,
    }));
}

function failedJobs(slug: string, surveys: SurveyView[], analyses: AnalysisView[]): Waiting {
  const ofSurveys = surveys
    .filter(({ isArchived, mapJob }) => !isArchived && mapJob?.status === 'failed')
    .map(({ name, slug: survey, mapJob }) => ({
      fact: `The maps of ${name} were not computed`,
      detail: mapJob?.fault ?? '',
      verb: 'Open',
      address: `/${slug}/surveys/${survey}`,
    }));
  const ofAnalyses = analyses
    .filter(({ state }) => state === 'failed')
    .map(({ key, runs }) => {
      const failed = runs.find(({ job }) => job.status === 'failed');
      return {
        fact: `Run ${failed?.number} of ${key} failed`,
        detail: failed?.job.fault ?? '',
        verb: 'Open',
        address: `/${slug}/analyses/${key}`,
      };
    });
  return [...ofSurveys, ...ofAnalyses];
}

interface Candidates {
  survey: string;
  slug: string;
  names: string[];
}

/** Candidates that nobody has decided on, inside the ranges of the lead analysis. */
async function undecidedCandidates(actor: Actor, lead: AnalysisView | null): Promise<Waiting> {
  if (!lead) return [];
  const { definition } = lead.population;
  const isPerHost = definition.form === 'mass-ratio';
  const [massMinMjup, massMaxMjup] = isPerHost
    ? [definition.massRatioMin, definition.massRatioMax].map((q) => q * JUPITER_MASSES_PER_SUN)
    : [definition.massMinMjup, definition.massMaxMjup];
  const { semiMajorAxisMinAu, semiMajorAxisMaxAu } = definition;
  const recipe: AnalysisRecipe = lead.recipe;
  const rows = await database().query<Candidates>(
    `select s.name as survey, s.slug, array_agg(t.name || ' ' || c.name order by t.name, c.name) as names
     from companion c join target t on t.id = c.target_id join survey s on s.id = t.survey_id
     where c.collaboration_id = $1 and t.survey_id = any($2::uuid[]) and t.left_out_reason is null
       and c.status in ('candidate', 'ambiguous')
       and c.mass_mjup / (case when $7 then t.host_mass_msun else 1 end) between $3 and $4
       and c.semi_major_axis_au between $5 and $6
     group by s.id order by s.position`,
    {
      bind: [
        actor.collaborationId,
        recipe.surveyIds,
        massMinMjup,
        massMaxMjup,
        semiMajorAxisMinAu,
        semiMajorAxisMaxAu,
        isPerHost,
      ],
      type: QueryTypes.SELECT,
    },
  );
  return rows.map(({ survey, slug, names }) => ({
    fact:
      names.length === 1
        ? '1 undecided candidate inside the ranges'
        : `${names.length} undecided candidates inside the ranges`,
    detail: `${survey}: ${names.join(', ')}`,
    verb: 'Look',
    address: `/${actor.collaboration}/candidates?survey=${slug}`,
  }));
}

/** Releases that lack a signature which this person may give, the newest first. */
async function unsignedReleases(actor: Actor): Promise<Waiting> {
  const maySignOff = may(actor, 'sign-off-release');
  const mayAgree = may(actor, 'agree-release');
  if (!maySignOff && !mayAgree) return [];
  const rows = await database().query<{
    key: string;
    title: string;
    isSignedOff: boolean;
    isAgreed: boolean;
    isOwnFreeze: boolean;
  }>(
    `select 'R-' || r.number as key, r.title, r.signed_off_at is not null as "isSignedOff",
       r.agreed_at is not null as "isAgreed",
       exists (select from release_run q join frozen_run f on f.run_id = q.run_id
               where q.release_id = r.id and f.frozen_by = $2) as "isOwnFreeze"
     from release r
     where r.collaboration_id = $1 and r.published_at is null
       and (r.signed_off_at is null or r.agreed_at is null)
     order by r.number desc`,
    { bind: [actor.collaborationId, actor.personId], type: QueryTypes.SELECT },
  );
  const isTwo =
    mayAgree &&
    rows.some(({ isOwnFreeze }) => isOwnFreeze) &&
    (await needsTwoPeople(actor.collaborationId));
  return rows.flatMap(({ key, title, isSignedOff, isAgreed, isOwnFreeze }) => {
    const steps = [
      ...(maySignOff && !isSignedOff ? ['a statistician signs it off'] : []),
      ...(mayAgree && !isAgreed && !(isTwo && isOwnFreeze) ? ['an author or an owner agrees'] : []),
    ];
    if (steps.length === 0) return [];
    const which = isSignedOff || isAgreed ? 'second signature' : 'signatures';
    return [
      {
        fact: `${key} waits for its ${which}`,
        detail: `${title}: ${steps.join(', ')}`,
        verb: 'Open',
        address: `/${actor.collaboration}/releases/${key}`,
      },
    ];
  });
}

async function openJobs(collaborationId: string): Promise<JobView[]> {
  const rows = await JobRow.findAll({
    where: { collaborationId, status: { [Op.in]: ['waiting', 'running'] } },
    order: [['createdAt', 'ASC']],
  });
  return describeJobs(rows);
}

/** Newest work, as every member may read it; who was invited or removed stands under Activity. */
function readLog(actor: Actor) {
  return database().query<{ at: Date; who: string; what: string }>(
    `select a.created_at as at, coalesce(p.name, 'somebody who left') as who, a.summary as what
     from audit_entry a left join person p on p.id = a.person_id
     where a.collaboration_id = $1 and a.summary <> ''
       and a.action = any($2::text[])
     order by a.created_at desc, a.id desc limit $3`,
    { bind: [actor.collaborationId, newsFor({ roles: [] }), LOG_LENGTH], type: QueryTypes.SELECT },
  );
}

/** What stands on the page of every member alike. */
async function readAlike(actor: Actor, lead: AnalysisView | null) {
  const { collaborationId } = actor;
  const [people, jobs, log, history, candidates] = await Promise.all([
    MemberRow.count({ where: { collaborationId } }),
    openJobs(collaborationId),
    readLog(actor),
    lead ? readHistory(lead.id) : [],
    undecidedCandidates(actor, lead),
  ]);
  return { people, jobs, log, history, candidates };
}

/** Where a collaboration stands, and what waits for a person. */
export async function getOverview(actor: Actor): Promise<Overview> {
  const { collaborationId, collaboration: slug } = actor;
  const [row, surveys, { analyses }, unsigned, sharing] = await Promise.all([
    together(`collaboration ${collaborationId}`, () =>
      CollaborationRow.findByPk(collaborationId, { rejectOnEmpty: true }),
    ),
    listSurveys(actor),
    listAnalyses(actor),
    unsignedReleases(actor),
    sharingNotices(actor),
  ]);
  const lead = leadOf(analyses, row.settings);
  const key = `overview ${collaborationId} ${lead?.id} ${lead?.updatedAt}`;
  const { history, candidates, log, ...facts } = await together(key, () => readAlike(actor, lead));
  return {
    ...facts,
    name: row.name,
    slug,
    surveys,
    lead: lead?.key ?? null,
    analyses,
    history: describeSteps(history),
    waiting: [
      ...failedJobs(slug, surveys.surveys, analyses),
      ...failedMaps(slug, surveys.surveys),
      ...candidates,
      ...unsigned,
      ...sharing,
    ],
    log: log.map(({ at, who, what }) => ({ at: at.toISOString(), who, what })),
    can: {
      invite: may(actor, 'invite'),
      addSurvey: may(actor, 'create-survey'),
      addAnalysis: may(actor, 'save-analysis', { isOwn: true }),
    },
  };
}
