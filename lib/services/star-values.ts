import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { Conflict, NotFound } from '@/lib/errors';
import { select } from '@/lib/queue/statement';
import type {
  AdoptedQuantity,
  Adoption,
  AdoptMany,
  AgeValue,
  DistanceValue,
  ValueTableView,
} from '@/lib/schemas/stars';
import {
  AdoptedValueRow,
  inTransaction,
  PersonRow,
  StarRow,
  TargetRow,
  ValueTableRow,
} from '@/models';
import { recordAudit } from './audit';
import { ageOf, distanceOf, type EntryRow, loadSky } from './star-facts';
import { refreshMaps } from './star-join';
import { findStar, leadsStar } from './stars';
import { together } from './together';

interface Chosen {
  value: AgeValue | DistanceValue | null;
  source: string;
}

/**
 * The value that a choice names.
 *
 * @throws NotFound for an entry of another star, or one without the quantity
 */
export function choose(
  { quantity, choice }: Pick<Adoption, 'quantity' | 'choice'>,
  entries: EntryRow[],
): Chosen {
  if (choice.kind === 'value') return { value: choice.value, source: choice.source };
  if (choice.kind === 'none') return { value: null, source: 'each survey’s own value' };
  const entry = entries.find(({ targetId }) => targetId === choice.targetId);
  if (!entry) throw new NotFound('entry of this star');
  const value = quantity === 'age' ? ageOf(entry) : distanceOf(entry);
  if (value === null) throw new NotFound(`${quantity} in this entry`);
  const reference = entry.reference === null ? '' : ` (${entry.reference})`;
  return { value, source: `from ${entry.surveyName}${reference}` };
}

/** Columns that an adopted value leaves empty must not keep a survey's. */
export function whole(quantity: AdoptedQuantity, value: Chosen['value']): Chosen['value'] {
  if (value === null) return null;
  const empty =
    quantity === 'age'
      ? { ageMyr: null, ageLowerMyr: null, ageUpperMyr: null, ageMinMyr: null, ageMaxMyr: null }
      : { distancePc: null, distanceErrorPc: null, parallaxMas: null, parallaxErrorMas: null };
  return { ...empty, ...value } as AgeValue | DistanceValue;
}

async function nextTable(
  actor: Actor,
  quantity: AdoptedQuantity,
  why: string,
  transaction: Transaction,
): Promise<ValueTableRow> {
  const { collaborationId } = actor;
  // One table after the other gets its number.
  await select(
    'select id from collaboration where id = $1 for no key update',
    [collaborationId],
    transaction,
  );
  const last = await ValueTableRow.max<number, ValueTableRow>('number', {
    where: { collaborationId, quantity },
    transaction,
  });
  return ValueTableRow.create(
    { collaborationId, quantity, number: (last ?? 0) + 1, why, createdBy: actor.personId },
    { transaction },
  );
}

/**
 * Adopts one age or distance each for stars, for all of their entries, in one new numbered table;
 * maps that rest on them are made anew.
 */
export async function adoptValues(actor: Actor, given: AdoptMany): Promise<void> {
  const { quantity, why, choices } = given;
  const { collaborationId } = actor;
  const sky = await loadSky(collaborationId);
  const chosen: (Chosen & { star: StarRow })[] = [];
  for (const { starId, choice } of choices) {
    const star = await findStar(actor, starId);
    const entries = sky.entriesOf.get(star.id) ?? [];
    demand(actor, 'adopt-values', { isLead: await leadsStar(actor, entries) });
    const asked = { quantity, choice } as Pick<Adoption, 'quantity' | 'choice'>;
    chosen.push({ star, ...choose(asked, entries) });
  }
  if (new Set(chosen.map(({ star }) => star.id)).size < chosen.length) {
    throw new Conflict('Two of the stars were found to be one: choose one value for it');
  }
  await inTransaction(async (transaction) => {
    const table = await nextTable(actor, quantity, why, transaction);
    await AdoptedValueRow.bulkCreate(
      chosen.map(({ star, value, source }) => ({
        tableId: table.id,
        collaborationId,
        starId: star.id,
        value: whole(quantity, value),
        source,
      })),
      { transaction },
    );
    const targets = await TargetRow.findAll({
      attributes: ['id', 'surveyId'],
      where: { starId: chosen.map(({ star }) => star.id) },
      transaction,
    });
    await refreshMaps(actor, targets, transaction);
    const [{ star, source }] = chosen;
    const what = chosen.length === 1 ? `${star.name} ${source}` : `${chosen.length} stars`;
    const summary = `made ${quantity}s table ${table.number}, ${what}: ${why}`;
    const item = { kind: 'value-table', id: table.id };
    await recordAudit(actor, 'adopt-values', item, summary, transaction);
  });
}

/** Adopts one value of one star. */
export function adoptValue(actor: Actor, starId: string, given: Adoption): Promise<void> {
  const { quantity, choice, why } = given;
  return adoptValues(actor, { quantity, choices: [{ starId, choice }], why } as AdoptMany);
}

/** Stars with an adopted value as of each table. */
const COUNTS = `
  select t.id, (select count(*)::int from (
      select distinct on (a.star_id) a.value from adopted_value a
        join value_table e on e.id = a.table_id
      where e.collaboration_id = t.collaboration_id and e.quantity = t.quantity
        and e.number <= t.number
      order by a.star_id, e.number desc) held where held.value is not null) as stars
  from value_table t where t.collaboration_id = $1`;

/** Tables of adopted ages and distances, newest first, each with what it changed. */
export async function listValueTables(actor: Actor): Promise<{ tables: ValueTableView[] }> {
  demand(actor, 'read');
  const { collaborationId } = actor;
  return together(`value tables ${collaborationId}`, () => readValueTables(collaborationId));
}

async function readValueTables(collaborationId: string): Promise<{ tables: ValueTableView[] }> {
  const [tables, values, counts] = await Promise.all([
    ValueTableRow.findAll({
      where: { collaborationId },
      order: [
        ['createdAt', 'DESC'],
        ['number', 'DESC'],
      ],
    }),
    AdoptedValueRow.findAll({ where: { collaborationId } }),
    select<{ id: string; stars: number }>(COUNTS, [collaborationId]),
  ]);
  const [people, stars] = await Promise.all([
    PersonRow.findAll({ where: { id: tables.flatMap(({ createdBy }) => createdBy ?? []) } }),
    StarRow.findAll({ where: { id: values.map(({ starId }) => starId) } }),
  ]);
  const nameOf = new Map([...people, ...stars].map(({ id, name }) => [id, name]));
  const countOf = new Map(counts.map(({ id, stars: count }) => [id, count]));
  return {
    tables: tables.map((table) => ({
      quantity: table.quantity,
      number: table.number,
      why: table.why,
      createdBy: (table.createdBy && nameOf.get(table.createdBy)) ?? null,
      createdAt: table.createdAt.toISOString(),
      stars: countOf.get(table.id) ?? 0,
      changes: values
        .filter(({ tableId }) => tableId === table.id)
        .map(({ starId, value, source }) => ({
          starId,
          star: nameOf.get(starId) ?? '',
          value,
          source,
        })),
    })),
  };
}
