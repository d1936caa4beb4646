import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { foldName } from '@/lib/formats';
import { idSchema } from '@/lib/schemas/common';
import type { StarList, StarPage, StarQuery, StarView } from '@/lib/schemas/stars';
import type { MapSettings } from '@/lib/schemas/surveys';
import { CompanionRow, ContrastCurveRow, database, StarRow, SurveyRow } from '@/models';
import { type PageAsked, pageOf } from './behind-row';
import {
  ageOf,
  conflictsOf,
  distanceOf,
  type EntryRow,
  heldValue,
  type ListedStar,
  loadSky,
  type Sky,
} from './star-facts';
import { matchesOf } from './star-overlaps';
import { currentYardstick, gridOfSettings, summariseMaps, type Yardstick } from './survey-depth';
import { companionView } from './targets';
import { together } from './together';

const foldedNames = (star: ListedStar, entries: EntryRow[]) =>
  [star.name, ...entries.flatMap(({ name, otherNames }) => [name, ...otherNames])].map(foldName);

/** Detection probabilities of maps under the yardstick, survey by survey on its grid. */
async function probabilitiesOf(
  collaborationId: string,
  entries: EntryRow[],
  yardstick: Yardstick,
): Promise<Map<string, number>> {
  const found = new Map<string, number>();
  if (yardstick.isFlat) return found;
  const surveys = await SurveyRow.findAll({
    attributes: ['id', 'mapSettings'],
    where: { id: [...new Set(entries.map(({ surveyId }) => surveyId))] },
  });
  for (const { id, mapSettings } of surveys) {
    const ids = entries.flatMap(({ surveyId, mapId }) => (surveyId === id && mapId ? [mapId] : []));
    const grid = gridOfSettings(mapSettings as MapSettings);
    const summaries = await summariseMaps(collaborationId, ids, yardstick, grid);
    for (const [mapId, { probability }] of summaries) found.set(mapId, probability);
  }
  return found;
}

function describeStar(
  star: ListedStar,
  sky: Sky,
  probabilities: ReadonlyMap<string, number>,
): StarView {
  const rows = sky.entriesOf.get(star.id) ?? [];
  const probabilityOf = ({ mapId }: Pick<EntryRow, 'mapId'>) =>
    mapId === null ? null : (probabilities.get(mapId) ?? null);
  const known = new Set([foldName(star.name)]);
  const otherNames: string[] = [];
  for (const name of rows.flatMap((row) => [row.name, ...row.otherNames])) {
    if (!known.has(foldName(name))) otherNames.push(name);
    known.add(foldName(name));
  }
  const counted = rows.filter(({ leftOutReason }) => leftOutReason === null);
  const best = counted.map(probabilityOf).filter((value) => value !== null);
  return {
    id: star.id,
    name: star.name,
    gaiaDr3Id: star.gaiaDr3Id ?? rows.find(({ gaiaDr3Id }) => gaiaDr3Id)?.gaiaDr3Id ?? null,
    otherNames,
    entries: rows.map(({ slug, surveyName, position, ...row }) => ({
      targetId: row.targetId,
      survey: { slug, name: surveyName, position },
      name: row.name,
      otherNames: row.otherNames,
      gaiaDr3Id: row.gaiaDr3Id,
      raDeg: row.raDeg,
      decDeg: row.decDeg,
      spectralType: row.spectralType,
      movingGroup: row.movingGroup,
      hostMassMsun: row.hostMassMsun,
      age: ageOf(row),
      distance: distanceOf(row),
      reference: row.reference,
      epochs: row.epochs,
      mapId: row.mapId,
      mapState: row.mapState,
      mapFault: row.mapFault,
      probability: probabilityOf(row),
      leftOutReason: row.leftOutReason,
      evidence: row.evidence,
    })),
    age: heldValue(rows, ageOf, sky.adopted.age.get(star.id), 'ages table'),
    distance: heldValue(rows, distanceOf, sky.adopted.distance.get(star.id), 'distances table'),
    conflicts: conflictsOf(rows),
    epochs: rows.reduce((sum, { epochs }) => sum + epochs, 0),
    probability: best.length === 0 ? null : Math.max(...best),
    undecided: sky.undecidedOf.get(star.id) ?? 0,
  };
}

/** A conflict is open until one value was adopted. */
function openConflicts(star: ListedStar, sky: Sky) {
  const { age, distance } = conflictsOf(sky.entriesOf.get(star.id) ?? []);
  return {
    age: age !== null && !sky.adopted.age.has(star.id),
    distance: distance !== null && !sky.adopted.distance.has(star.id),
  };
}

function isAsked(star: ListedStar, sky: Sky, { q, survey, only }: StarQuery): boolean {
  const entries = sky.entriesOf.get(star.id) ?? [];
  if (survey && !entries.some(({ slug }) => slug === survey)) return false;
  if (q) {
    const wanted = foldName(q);
    const isNamed = foldedNames(star, entries).some((name) => name.includes(wanted));
    const isNumbered = [star, ...entries].some(({ gaiaDr3Id }) => gaiaDr3Id?.includes(wanted));
    if (!isNamed && !isNumbered) return false;
  }
  if (only === 'shared') return entries.length > 1;
  if (only === 'adopted') return sky.adopted.age.has(star.id) || sky.adopted.distance.has(star.id);
  if (only === 'undecided') return sky.undecidedOf.has(star.id);
  if (only === 'age-conflict') return openConflicts(star, sky).age;
  if (only === 'distance-conflict') return openConflicts(star, sky).distance;
  return true;
}

type StarsAsked = StarQuery & Pick<PageAsked, 'after'>;

/** Stars by name, each once, with what every survey says of it. */
export async function listStars(actor: Actor, query: StarsAsked): Promise<StarList> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  const asked = JSON.stringify(query);
  return together(`stars ${collaborationId} ${asked}`, () => readStars(collaborationId, query));
}

async function readStars(collaborationId: string, query: StarsAsked): Promise<StarList> {
  const [sky, yardstick] = await Promise.all([
    loadSky(collaborationId),
    currentYardstick(collaborationId),
  ]);
  const asked = sky.stars.filter((star) => isAsked(star, sky, query));
  const page = pageOf(asked, query, ({ id }) => id);
  const shown = page.flatMap(({ id }) => sky.entriesOf.get(id) ?? []);
  const probabilities = await probabilitiesOf(collaborationId, shown, yardstick);
  const conflicts = sky.stars.map((star) => openConflicts(star, sky));
  const entries = [...sky.entriesOf.values()];
  return {
    stars: page.map((star) => describeStar(star, sky, probabilities)),
    total: asked.length,
    yardstick: yardstick.isFlat ? null : yardstick.view,
    counts: {
      stars: sky.stars.length,
      entries: entries.reduce((sum, rows) => sum + rows.length, 0),
      shared: entries.filter((rows) => rows.length > 1).length,
      undecided: sky.openPairs,
      ageConflicts: conflicts.filter(({ age }) => age).length,
      distanceConflicts: conflicts.filter(({ distance }) => distance).length,
    },
  };
}

/** The star of an id, or the one to which it was joined. */
export async function findStar(actor: Actor, id: string): Promise<StarRow> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  let star = idSchema.safeParse(id).success
    ? await StarRow.findOne({ where: { id, collaborationId } })
    : null;
  while (star?.mergedInto) star = await StarRow.findByPk(star.mergedInto);
  if (!star) throw new NotFound('star');
  return star;
}

/** Whether the actor leads a survey that lists the star. */
export async function leadsStar(actor: Actor, entries: Pick<EntryRow, 'surveyId'>[]) {
  const led = await SurveyRow.count({
    where: { id: entries.map(({ surveyId }) => surveyId), leadId: actor.personId },
  });
  return led > 0;
}

/** The newest finished run of each analysis that counts the star, with the star's part in it. */
function analysesOf(starId: string): Promise<StarPage['analyses']> {
  return database().query<StarPage['analyses'][number]>(
    `select 'A-' || a.number as key, a.name, used.number as run, used.probability,
       used.probability / nullif(used.total, 0) as share, p.name as population,
       case when p.definition->>'form' in ('power-law', 'shaped') then jsonb_build_object(
         'massMinMjup', p.definition->'massMinMjup', 'massMaxMjup', p.definition->'massMaxMjup',
         'semiMajorAxisMinAu', p.definition->'semiMajorAxisMinAu',
         'semiMajorAxisMaxAu', p.definition->'semiMajorAxisMaxAu') end as ranges
     from (
       select newest.*,
         (select sum(o.mean_completeness) from run_star o where o.run_id = newest.id) as total
       from (
         select distinct on (r.analysis_id) r.id, r.analysis_id, r.number, r.recipe,
           s.mean_completeness as probability
         from run r join run_star s on s.run_id = r.id
         where s.star_id in (select joined_stars($1))
         order by r.analysis_id, r.number desc) newest) used
     join analysis a on a.id = used.analysis_id
       join population p on p.id = (used.recipe->>'populationId')::uuid
     order by a.number`,
    { bind: [starId], type: QueryTypes.SELECT },
  );
}

/** The newest map that a run combined from several surveys' entries of the star. */
async function combinedOf(starId: string): Promise<StarPage['combined']> {
  const [found] = await database().query<NonNullable<StarPage['combined']>>(
    `select m.id as "mapId", m.inputs->>'rule' as rule, 'A-' || a.number as key, r.number as run,
       (select array_agg(v.name order by v.position) from survey v
         where v.id = any(s.survey_ids)) as surveys
     from run_star s join run r on r.id = s.run_id join analysis a on a.id = r.analysis_id
       join completeness_map m on m.id = s.map_id
     where s.star_id in (select joined_stars($1)) and cardinality(s.survey_ids) > 1
     order by r.finished_at desc limit 1`,
    { bind: [starId], type: QueryTypes.SELECT },
  );
  return found ?? null;
}

/** One star with everything that hangs on it. */
export async function getStar(actor: Actor, id: string): Promise<StarPage> {
  const star = await findStar(actor, id);
  const { collaborationId } = actor;
  const [sky, yardstick] = await Promise.all([
    loadSky(collaborationId, star.id),
    currentYardstick(collaborationId),
  ]);
  const rows = sky.entriesOf.get(star.id);
  if (!rows) throw new NotFound('star');
  const targetIds = rows.map(({ targetId }) => targetId);
  const [probabilities, curves, companions, analyses, matches, isLead, combined] =
    await Promise.all([
      probabilitiesOf(collaborationId, rows, yardstick),
      ContrastCurveRow.findAll({
        where: { targetId: targetIds, replacedAt: null },
        order: [
          ['epoch', 'ASC'],
          ['band', 'ASC'],
        ],
      }),
      CompanionRow.findAll({ where: { targetId: targetIds }, order: [['name', 'ASC']] }),
      analysesOf(star.id),
      matchesOf(actor, star.id),
      leadsStar(actor, rows),
      combinedOf(star.id),
    ]);
  const ownerOf = new Map(rows.map((row) => [row.targetId, row]));
  const surveyOf = (targetId: string) => ownerOf.get(targetId)?.surveyName ?? '';
  return {
    ...describeStar(star, sky, probabilities),
    yardstick: yardstick.isFlat ? null : yardstick.view,
    curves: curves.map((curve) => ({
      id: curve.id,
      targetId: curve.targetId,
      survey: surveyOf(curve.targetId),
      band: curve.band,
      epoch: curve.epoch,
      nSigma: curve.nSigma,
      separationArcsec: curve.separationArcsec,
      contrastMag: curve.contrastMag,
    })),
    companions: companions.map((row) => ({
      ...companionView(row, ownerOf.get(row.targetId)?.name),
      survey: surveyOf(row.targetId),
    })),
    analyses,
    combined,
    matches,
    can: { combine: may(actor, 'combine'), adopt: may(actor, 'adopt-values', { isLead }) },
  };
}
