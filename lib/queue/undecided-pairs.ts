import type { Transaction } from 'sequelize';
import { InputError } from '@/lib/errors';
import { listFirst } from './preconditions';
import { select } from './statement';

const OPEN = `
  select distinct least(one, other) as one, greatest(one, other) as other from (
    select root_of_star(first_star_id) as one, root_of_star(second_star_id) as other
    from star_match where collaboration_id = $1 and state in ('proposed', 'undone')) open
  where one <> other order by 1, 2`;

/** Stars of which a sample of these surveys counts an entry, each under one name. */
const COUNTED = `
  select t.star_id as id, min(t.name) as name from target t
  where t.collaboration_id = $1 and t.survey_id = any($2::uuid[]) and t.left_out_reason is null
    and (t.map_state <> 'none' or exists (
      select 1 from contrast_curve c where c.target_id = t.id and c.replaced_at is null))
  group by t.star_id`;

/**
 * Refuses a sample in which a star might stand twice.
 *
 * @param nameOf the sample's stars by id
 * @throws InputError that lists the pairs of which nobody has said whether they are one
 */
export async function refuseUndecided(
  collaborationId: string,
  nameOf: ReadonlyMap<string, string>,
  transaction: Transaction,
): Promise<void> {
  const open = await select<{ one: string; other: string }>(OPEN, [collaborationId], transaction);
  const pairs = open
    .flatMap(({ one, other }) => {
      const names = [nameOf.get(one), nameOf.get(other)];
      return names.includes(undefined) ? [] : [names.sort().join(' and ')];
    })
    .sort();
  if (pairs.length === 0) return;
  const count = pairs.length === 1 ? '1 pair' : `${pairs.length} pairs`;
  throw new InputError({
    code: 'undecided-pair',
    message:
      `${count} of stars may each be one star, and a star counts once: ${listFirst(pairs)}. ` +
      'Take each pair for one or keep it apart, under Stars, Overlaps',
  });
}

/** The same before anything is queued, for all stars of the surveys. */
export async function refuseUndecidedIn(
  collaborationId: string,
  surveyIds: string[],
  transaction: Transaction,
): Promise<void> {
  const stars = await select<{ id: string; name: string }>(
    COUNTED,
    [collaborationId, surveyIds],
    transaction,
  );
  await refuseUndecided(
    collaborationId,
    new Map(stars.map(({ id, name }) => [id, name])),
    transaction,
  );
}
