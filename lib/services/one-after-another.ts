import { database, inOneTransaction } from '@/models';

/**
 * The work after everybody else's on the same thing, in one transaction with whatever it reads
 * first: what was compared is what is changed.
 *
 * @param owner id of the collaboration or person whose thing it is
 * @param params parts of the address; writes whose parts are the same wait for each other
 */
export function oneAfterAnother<T>(
  owner: string,
  params: Record<string, string>,
  work: () => Promise<T>,
): Promise<T> {
  const { collaboration: _, ...parts } = params;
  const thing = JSON.stringify([owner, parts]);
  return inOneTransaction(async (transaction) => {
    await database().query('select pg_advisory_xact_lock(hashtextextended($1, 0))', {
      bind: [thing],
      transaction,
    });
    return work();
  });
}
