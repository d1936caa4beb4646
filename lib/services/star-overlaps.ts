import { QueryTypes } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { MATCH_ARCSEC, MATCH_DISTANCE_RATIO } from '@/lib/quantities/sky-match';
import type { MatchEvidence, Overlaps, StarMatchView } from '@/lib/schemas/stars';
import { database, PersonRow, StarMatchRow, type StarRow, SurveyRow, TargetRow } from '@/models';
import { pairKey, rootsOf, skyEntryOf } from './star-sky';

/** Doubt of a pair whose distances cannot be compared. */
const UNKNOWN_DISTANCE = 0.6;
/** Within 1″ and 2 % in distance: a fifth of what the rule allows. */
const PLAIN_DOUBT = 0.2;

/** How near to the edge of the rule a pair lies, 0 to 1: an order for reading, not a probability. */
function doubtOf({ by, separationArcsec, distanceRatio }: MatchEvidence): number {
  if (by !== 'position') return 0;
  const ofDistance =
    distanceRatio == null ? UNKNOWN_DISTANCE : (distanceRatio - 1) / (MATCH_DISTANCE_RATIO - 1);
  return Math.max((separationArcsec ?? 0) / MATCH_ARCSEC, ofDistance);
}

type NamedStar = Pick<StarRow, 'id' | 'name' | 'mergedInto'>;

interface Context {
  rootOf(id: string): string;
  starOf: Map<string, NamedStar>;
  surveyOf: Map<string, SurveyRow>;
  targetsOf: Map<string, TargetRow[]>;
  personOf: Map<string, string>;
}

/** A pair's stars as they were before it was confirmed: with the entries that each brought. */
function entriesOf(match: StarMatchRow, starId: string, context: Context): TargetRow[] {
  const { absorbedStarId, movedTargetIds } = match;
  const moved = new Set(movedTargetIds);
  const held = context.targetsOf.get(context.rootOf(starId)) ?? [];
  if (absorbedStarId === null) return held;
  const isAbsorbed = isUnder(context, starId, absorbedStarId);
  return held.filter(({ id }) => moved.has(id) === isAbsorbed);
}

/** Whether a star is another, or was joined to it on the way to its root. */
function isUnder({ starOf }: Context, starId: string, ancestorId: string): boolean {
  for (let star = starOf.get(starId); star; star = starOf.get(star.mergedInto ?? '')) {
    if (star.id === ancestorId) return true;
  }
  return false;
}

function describeMatch(match: StarMatchRow, context: Context): Omit<StarMatchView, 'isPlain'> {
  const sideOf = (starId: string): StarMatchView['stars'][number] => {
    const shown = match.absorbedStarId === null ? context.rootOf(starId) : starId;
    return {
      id: context.rootOf(starId),
      name: context.starOf.get(shown)?.name ?? '',
      entries: entriesOf(match, starId, context).flatMap((target) => {
        const survey = context.surveyOf.get(target.surveyId);
        if (!survey) return [];
        const place = skyEntryOf(target);
        return [
          {
            targetId: target.id,
            name: target.name,
            survey: { slug: survey.slug, name: survey.name, position: survey.position },
            raDeg: target.raDeg,
            decDeg: target.decDeg,
            epochYr: place?.epochYr ?? 2000,
            pmRaMasYr: place?.pmRaMasYr ?? null,
            pmDecMasYr: place?.pmDecMasYr ?? null,
            distancePc:
              target.distancePc ?? (target.parallaxMas === null ? null : 1000 / target.parallaxMas),
            spectralType: target.spectralType,
          },
        ];
      }),
    };
  };
  return {
    id: match.id,
    state: match.state,
    evidence: match.evidence,
    doubt: doubtOf(match.evidence),
    stars: [sideOf(match.firstStarId), sideOf(match.secondStarId)],
    decidedBy: match.decidedBy === null ? null : (context.personOf.get(match.decidedBy) ?? null),
    decidedAt: match.decidedAt?.toISOString() ?? null,
    why: match.why,
  };
}

/** Stars, and those that they were joined to on the way to their roots. */
function readChains(starIds: string[]): Promise<NamedStar[]> {
  return database().query<NamedStar>(
    `with recursive chain as (
       select id, name, merged_into from star where id = any($1::uuid[])
       union select s.id, s.name, s.merged_into from star s join chain on s.id = chain.merged_into)
     select id, name, merged_into as "mergedInto" from chain`,
    { bind: [starIds], type: QueryTypes.SELECT },
  );
}

async function loadContext(collaborationId: string, matches: StarMatchRow[]): Promise<Context> {
  const stars = await readChains(
    matches.flatMap(({ firstStarId, secondStarId }) => [firstStarId, secondStarId]),
  );
  const roots = rootsOf(stars);
  const rootOf = (id: string) => roots.get(id) ?? id;
  const concerned = new Set(
    matches.flatMap(({ firstStarId, secondStarId }) => [rootOf(firstStarId), rootOf(secondStarId)]),
  );
  const [targets, surveys, people] = await Promise.all([
    TargetRow.findAll({
      where: { starId: [...concerned] },
      order: [
        ['foldedName', 'ASC'],
        ['id', 'ASC'],
      ],
    }),
    SurveyRow.findAll({ where: { collaborationId } }),
    PersonRow.findAll({ where: { id: matches.flatMap(({ decidedBy }) => decidedBy ?? []) } }),
  ]);
  const targetsOf = new Map<string, TargetRow[]>();
  for (const target of targets) {
    targetsOf.set(target.starId, [...(targetsOf.get(target.starId) ?? []), target]);
  }
  return {
    rootOf,
    starOf: new Map(stars.map((star) => [star.id, star])),
    surveyOf: new Map(surveys.map((survey) => [survey.id, survey])),
    targetsOf,
    personOf: new Map(people.map(({ id, name }) => [id, name])),
  };
}

const isOpen = ({ state }: StarMatchRow) => state === 'proposed' || state === 'undone';

/** Open pairs that a person may take together: sure, and no star of theirs waits in another pair. */
function markPlain(open: Omit<StarMatchView, 'isPlain'>[]): StarMatchView[] {
  const pairsOf = new Map<string, number>();
  const ids = open.flatMap(({ stars }) => stars.map(({ id }) => id));
  for (const id of ids) pairsOf.set(id, (pairsOf.get(id) ?? 0) + 1);
  return open.map((pair) => {
    const isOnly = pair.stars.every(({ id }) => pairsOf.get(id) === 1);
    return { ...pair, isPlain: isOnly && pair.doubt <= PLAIN_DOUBT };
  });
}

/** Pairs of a star, or of one that was joined to it. */
async function pairsOfStar({ collaborationId }: Actor, starId: string): Promise<string[]> {
  const rows = await database().query<{ id: string }>(
    `select m.id from star_match m where m.collaboration_id = $1 and (
       m.first_star_id in (select joined_stars($2)) or m.second_star_id in (select joined_stars($2)))`,
    { bind: [collaborationId, starId], type: QueryTypes.SELECT },
  );
  return rows.map(({ id }) => id);
}

/** Pairs to decide, surest first, each two stars once; and what was decided, newest first. */
async function readMatches(actor: Actor, starId?: string) {
  const rows = await StarMatchRow.findAll({
    where: {
      collaborationId: actor.collaborationId,
      ...(starId !== undefined && { id: await pairsOfStar(actor, starId) }),
    },
    order: [
      ['decidedAt', 'DESC NULLS LAST'],
      ['id', 'ASC'],
    ],
  });
  const context = await loadContext(actor.collaborationId, rows);
  const keyOf = ({ firstStarId, secondStarId }: StarMatchRow) =>
    pairKey(context.rootOf(firstStarId), context.rootOf(secondStarId));
  const open = new Map<string, StarMatchRow>();
  for (const row of rows.filter(isOpen)) {
    const isOne = context.rootOf(row.firstStarId) === context.rootOf(row.secondStarId);
    if (!isOne && !open.has(keyOf(row))) open.set(keyOf(row), row);
  }
  const describe = (row: StarMatchRow) => describeMatch(row, context);
  const decided = rows.filter((row) => !isOpen(row)).map(describe);
  return {
    open: markPlain([...open.values()].map(describe).sort((a, b) => a.doubt - b.doubt)),
    decided: decided.map((pair) => ({ ...pair, isPlain: false })),
  };
}

/** Every pair that concerns one star, open ones first. */
export async function matchesOf(actor: Actor, starId: string): Promise<StarMatchView[]> {
  const { open, decided } = await readMatches(actor, starId);
  return [...open, ...decided];
}

export async function listOverlaps(actor: Actor): Promise<Overlaps> {
  demand(actor, 'read');
  const bind = [actor.collaborationId];
  const [matches, [counts]] = await Promise.all([
    readMatches(actor),
    database().query<Overlaps['automatic'] & { entries: number; stars: number }>(
      `select (count(*) filter (where star_evidence->>'by' = 'identifier'))::int as identifier,
         (count(*) filter (where star_evidence->>'by' = 'name'))::int as name,
         count(*)::int as entries, count(distinct star_id)::int as stars
       from target where collaboration_id = $1`,
      { bind, type: QueryTypes.SELECT },
    ),
  ]);
  const { entries, stars, identifier, name } = counts;
  return {
    ...matches,
    automatic: { identifier, name },
    entries,
    stars,
    canDecide: may(actor, 'combine'),
  };
}
