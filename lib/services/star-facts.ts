import { QueryTypes } from 'sequelize';
import { CONFLICT_SIGMA, type StatedValue, worstDisagreement } from '@/lib/quantities/agreement';
import type { AgeValue, DistanceValue, StarEntry, StarView } from '@/lib/schemas/stars';
import { database, StarRow } from '@/models';
import { type AdoptedValues, loadAdopted } from '@/models/adopted-values';

/** A target with its survey, as one row. */
export type EntryRow = AgeValue &
  DistanceValue &
  Omit<StarEntry, 'survey' | 'age' | 'distance' | 'probability'> & {
    starId: string;
    surveyId: string;
    slug: string;
    surveyName: string;
    position: number;
  };

const ENTRIES = `
  select t.id as "targetId", t.star_id as "starId", t.survey_id as "surveyId",
    s.slug, s.name as "surveyName", s.position, t.name, t.other_names as "otherNames",
    t.gaia_dr3_id as "gaiaDr3Id", t.ra_deg as "raDeg", t.dec_deg as "decDeg",
    t.spectral_type as "spectralType", t.moving_group as "movingGroup",
    t.host_mass_msun as "hostMassMsun",
    t.age_myr as "ageMyr", t.age_lower_myr as "ageLowerMyr", t.age_upper_myr as "ageUpperMyr",
    t.age_min_myr as "ageMinMyr", t.age_max_myr as "ageMaxMyr",
    t.distance_pc as "distancePc", t.distance_error_pc as "distanceErrorPc",
    t.parallax_mas as "parallaxMas", t.parallax_error_mas as "parallaxErrorMas",
    t.attributes->>'reference' as reference, t.map_id as "mapId", t.map_state as "mapState",
    t.map_fault as "mapFault", t.left_out_reason as "leftOutReason", t.star_evidence as evidence,
    (select count(distinct coalesce(c.epoch, ''))::int from contrast_curve c
      where c.target_id = t.id and c.replaced_at is null) as epochs
  from target t join survey s on s.id = t.survey_id
  where t.collaboration_id = $1 and ($2::uuid is null or t.star_id = $2)
    and (s.share_id is null or not is_withdrawn(s.share_id))
  order by s.position, s.id, t.folded_name`;

export type ListedStar = Pick<StarRow, 'id' | 'name' | 'gaiaDr3Id'>;

/** Everything known of a collaboration's stars, or of one of them. */
export interface Sky {
  stars: ListedStar[];
  entriesOf: Map<string, EntryRow[]>;
  adopted: AdoptedValues;
  /** Open pairs per star. */
  undecidedOf: Map<string, number>;
  openPairs: number;
}

export async function loadSky(collaborationId: string, starId?: string): Promise<Sky> {
  const [stars, rows, adopted, open] = await Promise.all([
    // Plain rows: to dress thousands of them takes longer than to read them.
    StarRow.findAll({
      attributes: ['id', 'name', 'gaiaDr3Id'],
      raw: true,
      where: { collaborationId, mergedInto: null, ...(starId && { id: starId }) },
      order: [
        ['foldedName', 'ASC'],
        ['id', 'ASC'],
      ],
    }),
    database().query<EntryRow>(ENTRIES, {
      bind: [collaborationId, starId ?? null],
      type: QueryTypes.SELECT,
    }),
    loadAdopted(collaborationId),
    database().query<{ one: string; other: string }>(
      `select distinct least(a, b) as one, greatest(a, b) as other from (
         select root_of_star(first_star_id) as a, root_of_star(second_star_id) as b
         from star_match where collaboration_id = $1 and state in ('proposed', 'undone')) open
       where a <> b`,
      { bind: [collaborationId], type: QueryTypes.SELECT },
    ),
  ]);
  const entriesOf = new Map<string, EntryRow[]>();
  for (const row of rows) {
    const list = entriesOf.get(row.starId);
    if (list) list.push(row);
    else entriesOf.set(row.starId, [row]);
  }
  const undecidedOf = new Map<string, number>();
  for (const pair of open) {
    for (const id of [pair.one, pair.other]) undecidedOf.set(id, (undecidedOf.get(id) ?? 0) + 1);
  }
  return {
    stars: stars.filter(({ id }) => entriesOf.has(id)),
    entriesOf,
    adopted,
    undecidedOf,
    openPairs: open.length,
  };
}

export function ageOf(row: AgeValue): AgeValue | null {
  const { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr } = row;
  if (ageMyr === null && (ageMinMyr === null || ageMaxMyr === null)) return null;
  return { ageMyr, ageLowerMyr, ageUpperMyr, ageMinMyr, ageMaxMyr };
}

export function distanceOf(row: DistanceValue): DistanceValue | null {
  const { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas } = row;
  if (distancePc === null && parallaxMas === null) return null;
  return { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas };
}

const statedAge = (age: AgeValue): StatedValue => ({
  value: age.ageMyr,
  lower: age.ageLowerMyr,
  upper: age.ageUpperMyr,
  min: age.ageMinMyr,
  max: age.ageMaxMyr,
});

function statedDistance(given: DistanceValue): StatedValue {
  const { distancePc, distanceErrorPc, parallaxMas, parallaxErrorMas } = given;
  const value = distancePc ?? 1000 / (parallaxMas as number);
  const share = distancePc === null ? (parallaxErrorMas ?? 0) / (parallaxMas as number) : 0;
  const error = distancePc === null ? value * share : distanceErrorPc;
  return {
    value,
    lower: error === null ? null : value - error,
    upper: error === null ? null : value + error,
    min: null,
    max: null,
  };
}

/** More than two sigma, or null where the surveys agree. */
function conflictOf(values: StatedValue[]): number | 'differs' | null {
  const worst = worstDisagreement(values);
  if (worst === null || worst <= CONFLICT_SIGMA) return null;
  return Number.isFinite(worst) ? worst : 'differs';
}

const isThere = <Value>(value: Value | null): value is Value => value !== null;

export function conflictsOf(entries: EntryRow[]): StarView['conflicts'] {
  return {
    age: conflictOf(entries.map(ageOf).filter(isThere).map(statedAge)),
    distance: conflictOf(entries.map(distanceOf).filter(isThere).map(statedDistance)),
  };
}

/** The value that maps rest on: the adopted one, else that of the survey listed first. */
export function heldValue<Value>(
  entries: EntryRow[],
  read: (row: EntryRow) => Value | null,
  adopted: { value: Value; source: string; table: number } | undefined,
  tableName: string,
): { value: Value; source: NonNullable<StarView['age']>['source'] } | null {
  if (adopted) {
    const { value, source, table } = adopted;
    return { value, source: { kind: 'adopted', words: `${tableName} ${table}, ${source}`, table } };
  }
  for (const row of entries) {
    const value = read(row);
    if (value !== null) {
      return { value, source: { kind: 'survey', words: row.surveyName, table: null } };
    }
  }
  return null;
}
