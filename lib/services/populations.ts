import { QueryTypes, type Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand, may } from '@/lib/access/permissions';
import { InputError, NotFound } from '@/lib/errors';
import { describePopulation } from '@/lib/inference';
import {
  checkPopulation,
  type Population,
  type StatedConventions,
  type SystemsSummary,
  toStoredPopulation,
} from '@/lib/population';
import type { CreateVersion } from '@/lib/schemas/population-versions';
import {
  type CreatePopulation,
  type ListedPopulation,
  listedPopulationSchema,
  type PopulationDefinition,
  type PopulationView,
  populationSchema,
} from '@/lib/schemas/populations';
import { database, inTransaction, PopulationRow } from '@/models';
import { digestOf } from '@/models/digest';
import { recordAudit } from './audit';
import { together } from './together';

const KEY = /^P-([1-9][0-9]{0,8})$/;

function numberOf(key: string): number {
  const number = KEY.exec(key)?.[1];
  if (number === undefined) throw new NotFound('population');
  return Number(number);
}

/** The definition as it is stored: indices per natural logarithm, and refused if it cannot be used. */
export function toStored(
  definition: PopulationDefinition,
  conventions: StatedConventions,
): PopulationDefinition {
  const stored = toStoredPopulation(definition, conventions);
  try {
    checkPopulation(stored);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new InputError({ code: 'population', item: 'definition', message: error.message });
  }
  return stored;
}

/** What a request says of its indices: the axis follows the mass where nothing else is named. */
const conventionsOf = (input: Pick<CreateVersion, 'convention' | 'semiMajorAxisConvention'>) => ({
  mass: input.convention,
  semiMajorAxis: input.semiMajorAxisConvention ?? input.convention,
});

interface Fields<Definition = Population> {
  id: string;
  number: number;
  version: number;
  name: string;
  note: string;
  definition: Definition;
  digest: string;
  isShared: boolean;
  createdBy: string | null;
  createdAt: Date;
  beganById: string | null;
  usedBy: string[];
  isLatest: boolean;
}

/** Who made the first version owns the population; once shared it is everybody's. */
const standing = (actor: Actor, row: Pick<Fields, 'beganById' | 'isShared'>) => ({
  isOwn: row.beganById === actor.personId && !row.isShared,
});

type Listed = Fields<Population | SystemsSummary>;

const toView = (actor: Actor, row: Fields): PopulationView =>
  populationSchema.parse(viewOf(actor, row));
const toListed = (actor: Actor, row: Listed): ListedPopulation =>
  listedPopulationSchema.parse(viewOf(actor, row));

function viewOf(actor: Actor, row: Listed) {
  return {
    id: row.id,
    key: `P-${row.number}`,
    number: row.number,
    version: row.version,
    name: row.name,
    note: row.note,
    definition: row.definition,
    words: describePopulation(row.definition),
    digest: row.digest,
    isShared: row.isShared,
    createdBy: row.createdBy,
    createdAt: row.createdAt.toISOString(),
    usedBy: row.usedBy,
    can: {
      saveVersion: row.isLatest && may(actor, 'save-population', standing(actor, row)),
      share: !row.isShared && may(actor, 'share-population'),
    },
  };
}

const extreme = (which: 'min' | 'max', column: string) =>
  `(select ${which}(x::float8) from jsonb_array_elements_text(p.definition->'${column}') x)`;

/** Of tabulated systems counts and box, as `summariseSystems` gives them; all others whole. */
export const LISTED_DEFINITION = `case when p.definition->>'form' = 'systems' then jsonb_build_object(
  'form', 'systems',
  'systems', jsonb_array_length(p.definition->'weight'),
  'companions', jsonb_array_length(p.definition->'companionSystem'),
  'massMinMjup', ${extreme('min', 'massMjup')},
  'massMaxMjup', ${extreme('max', 'massMjup')},
  'semiMajorAxisMinAu', ${extreme('min', 'semiMajorAxisAu')},
  'semiMajorAxisMaxAu', ${extreme('max', 'semiMajorAxisAu')}) else p.definition end`;

interface Wanted {
  number?: number;
  ids?: string[];
}

async function readPopulations<Row extends Listed>(
  actor: Actor,
  definition: string,
  { number, ids }: Wanted,
  transaction?: Transaction,
): Promise<Row[]> {
  return database().query<Row>(
    `select p.id, p.number, p.version, p.name, p.note, ${definition} as definition, p.digest,
            p.is_shared as "isShared", w.name as "createdBy", p.created_at as "createdAt",
            first_value(p.created_by) over versions as "beganById",
            p.version = max(p.version) over (partition by p.number) as "isLatest",
            coalesce((select array_agg('A-' || a.number order by a.number) from analysis a
                       where a.collaboration_id = p.collaboration_id
                         and a.recipe->>'populationId' = p.id::text), '{}') as "usedBy"
       from population p left join person w on w.id = p.created_by
      where p.collaboration_id = $1 and ($2::int is null or p.number = $2)
        and ($3::uuid[] is null or p.number in (select number from population
              where collaboration_id = $1 and id = any($3::uuid[])))
     window versions as (partition by p.number order by p.version)
      order by p.number desc, p.version desc`,
    {
      bind: [actor.collaborationId, number ?? null, ids ?? null],
      type: QueryTypes.SELECT,
      transaction,
    },
  );
}

/** Every version in the collaboration, newest population and version first. */
export async function listPopulations(actor: Actor): Promise<{ populations: ListedPopulation[] }> {
  demand(actor, 'read');
  const rows = await together(`populations ${actor.collaborationId}`, () =>
    readPopulations<Listed>(actor, LISTED_DEFINITION, {}),
  );
  return { populations: rows.map((row) => toListed(actor, row)) };
}

async function findVersion(
  actor: Actor,
  key: string,
  version: number | undefined,
  transaction?: Transaction,
): Promise<Fields> {
  const wanted = { number: numberOf(key) };
  const rows = await readPopulations<Listed>(actor, LISTED_DEFINITION, wanted, transaction);
  const row = version === undefined ? rows[0] : rows.find((one) => one.version === version);
  if (!row) throw new NotFound('population');
  const where = { id: row.id, collaborationId: actor.collaborationId };
  const whole = await PopulationRow.findOne({ where, transaction });
  if (!whole) throw new NotFound('population');
  return { ...row, definition: whole.definition };
}

/** The newest version of a population, or the one that is asked for. */
export async function getPopulation(
  actor: Actor,
  key: string,
  version?: number,
): Promise<PopulationView> {
  demand(actor, 'read');
  return toView(actor, await findVersion(actor, key, version));
}

/** Numbers are given one after the other: whoever takes one holds the collaboration's row. */
async function lockNumbers(actor: Actor, transaction: Transaction): Promise<void> {
  await database().query('select id from collaboration where id = $1 for update', {
    bind: [actor.collaborationId],
    transaction,
  });
}

interface Insert {
  number: number;
  version: number;
  name: string;
  note: string;
  convention: CreateVersion['convention'];
  semiMajorAxisConvention?: CreateVersion['semiMajorAxisConvention'];
  definition: PopulationDefinition;
  isShared: boolean;
}

async function insert(
  actor: Actor,
  input: Insert,
  transaction: Transaction,
): Promise<PopulationView> {
  const { number, version, name, note, isShared } = input;
  const definition = toStored(input.definition, conventionsOf(input));
  const digest = digestOf(definition);
  const { collaborationId } = actor;
  const createdBy = actor.personId;
  await PopulationRow.create(
    { collaborationId, number, version, name, note, definition, digest, isShared, createdBy },
    { transaction },
  );
  const key = `P-${number}`;
  const item = { kind: 'population', id: key };
  const summary = version === 1 ? `saved population ${key}` : `saved version ${version} of ${key}`;
  await recordAudit(actor, 'save-population', item, summary, transaction, { version, digest });
  return toView(actor, await findVersion(actor, key, version, transaction));
}

/** A new population, version 1; with `versionOf`, a new version of that one. */
export async function createPopulation(
  actor: Actor,
  input: CreatePopulation,
): Promise<PopulationView> {
  return inTransaction((transaction) => createPopulationIn(actor, input, transaction));
}

/** The same inside a transaction that stores more, such as the file that it comes from. */
export async function createPopulationIn(
  actor: Actor,
  input: CreatePopulation,
  transaction: Transaction,
): Promise<PopulationView> {
  const { versionOf, ...version } = input;
  if (versionOf !== undefined) return addVersion(actor, `P-${versionOf}`, version, transaction);
  demand(actor, 'save-population', { isOwn: true });
  if (input.isShared) demand(actor, 'share-population');
  await lockNumbers(actor, transaction);
  const newest = await PopulationRow.max<number | null, PopulationRow>('number', {
    where: { collaborationId: actor.collaborationId },
    transaction,
  });
  return insert(actor, { ...version, number: (newest ?? 0) + 1, version: 1 }, transaction);
}

/** A new version; earlier ones stay as they are, and so does what was made with them. */
export async function createPopulationVersion(
  actor: Actor,
  key: string,
  input: CreateVersion,
): Promise<PopulationView> {
  return inTransaction((transaction) => addVersion(actor, key, input, transaction));
}

async function addVersion(
  actor: Actor,
  key: string,
  input: CreateVersion,
  transaction: Transaction,
): Promise<PopulationView> {
  await lockNumbers(actor, transaction);
  const before = await findVersion(actor, key, undefined, transaction);
  demand(actor, 'save-population', standing(actor, before));
  const isShared = input.isShared ?? before.isShared;
  if (isShared) demand(actor, 'share-population');
  const { number, name } = before;
  return insert(
    actor,
    { ...input, name: input.name ?? name, number, version: before.version + 1, isShared },
    transaction,
  );
}

/** Shares a version with all, or takes it back; its definition stays. */
export async function sharePopulation(
  actor: Actor,
  key: string,
  version: number | undefined,
  input: { isShared: boolean },
): Promise<PopulationView> {
  return inTransaction(async (transaction) => {
    const row = await findVersion(actor, key, version, transaction);
    demand(actor, 'share-population');
    await PopulationRow.update(
      { isShared: input.isShared },
      { where: { id: row.id, collaborationId: actor.collaborationId }, transaction },
    );
    const item = { kind: 'population', id: key };
    const summary = `${input.isShared ? 'shared' : 'no longer shares'} version ${row.version} of ${key}`;
    await recordAudit(actor, 'share-population', item, summary, transaction);
    return toView(actor, await findVersion(actor, key, row.version, transaction));
  });
}

/**
 * Populations as analyses name them, by id.
 *
 * @returns only those of the actor's collaboration: a foreign id is as absent as an unknown one
 */
export async function findPopulationsById(
  actor: Actor,
  ids: readonly string[],
  transaction?: Transaction,
): Promise<Map<string, ListedPopulation>> {
  const wanted = new Set(ids);
  const rows = await readPopulations<Listed>(
    actor,
    LISTED_DEFINITION,
    { ids: [...wanted] },
    transaction,
  );
  return new Map(
    rows.filter((row) => wanted.has(row.id)).map((row) => [row.id, toListed(actor, row)]),
  );
}
