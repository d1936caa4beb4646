import { QueryTypes, type Transaction } from 'sequelize';
import type { AdoptedQuantity, AgeValue, DistanceValue } from '@/lib/schemas/stars';
import { database } from './index';
import type { TargetRow } from './target';

interface Adopted<Value> {
  value: Value;
  source: string;
  /** Number of the table that adopted it. */
  table: number;
}

/** The newest tables of adopted ages and distances, by star. */
export interface AdoptedValues {
  age: Map<string, Adopted<AgeValue>>;
  distance: Map<string, Adopted<DistanceValue>>;
  /** Number of the newest table; null before the first. */
  newest: Record<AdoptedQuantity, number | null>;
}

interface Row {
  quantity: AdoptedQuantity;
  star: string;
  value: AgeValue | DistanceValue | null;
  source: string;
  table: number;
}

/** Of stars that were found to be one, the newest adopted value holds. */
const NEWEST = `
  select distinct on (t.quantity, star)
    t.quantity, root_of_star(a.star_id) as star, a.value, a.source, t.number as "table"
  from adopted_value a join value_table t on t.id = a.table_id
  where t.collaboration_id = $1 and t.quantity = any($2)
  order by t.quantity, star, t.number desc`;

export async function loadAdopted(
  collaborationId: string,
  transaction?: Transaction,
): Promise<AdoptedValues> {
  const rows = await database().query<Row>(NEWEST, {
    bind: [collaborationId, ['age', 'distance']],
    type: QueryTypes.SELECT,
    transaction,
  });
  const counts = await database().query<{ quantity: AdoptedQuantity; newest: number }>(
    'select quantity, max(number) as newest from value_table where collaboration_id = $1 group by 1',
    { bind: [collaborationId], type: QueryTypes.SELECT, transaction },
  );
  const adopted: AdoptedValues = {
    age: new Map(),
    distance: new Map(),
    newest: { age: null, distance: null },
  };
  for (const { quantity, newest } of counts) adopted.newest[quantity] = newest;
  for (const { quantity, star, value, source, table } of rows) {
    if (value === null) continue;
    if (quantity === 'age') adopted.age.set(star, { value: value as AgeValue, source, table });
    else adopted.distance.set(star, { value: value as DistanceValue, source, table });
  }
  return adopted;
}

/** Puts what was adopted for its star in the place of what the survey says; the row is not stored. */
export function applyAdopted(target: TargetRow, adopted: AdoptedValues): void {
  const age = adopted.age.get(target.starId);
  const distance = adopted.distance.get(target.starId);
  if (age) target.set(age.value);
  if (distance) target.set(distance.value);
}
