import { QueryTypes } from 'sequelize';
import { afterAll, expect, it, vi } from 'vitest';
import { collaborationRoute } from '@/app/api/v1/handler';
import { closeDatabase, database, inOneTransaction, takeTime } from '@/models';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';

withDatabase();
const shown = async (name: string) => {
  const [row] = await database().query<Record<string, string>>(`show ${name}`, {
    type: QueryTypes.SELECT,
  });
  return row[name];
};
const forget = () => {
  (globalThis as { rareboundTakesItsTime?: boolean }).rareboundTakesItsTime = undefined;
};
afterAll(forget);

it('limits what a page may ask, and lets a worker take its time', async () => {
  expect(await shown('statement_timeout')).toBe('30s');
  expect(await shown('idle_in_transaction_session_timeout')).toBe('1min');
  await closeDatabase();
  takeTime();
  expect(await shown('statement_timeout')).toBe('0');
  await closeDatabase();
  forget();
});

it('says when a statement was cut off, and when to ask again', async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const slow = collaborationRoute({ scope: 'write' }, () =>
    inOneTransaction(async (transaction) => {
      await database().query('set local statement_timeout = 20', { transaction });
      await database().query('select pg_sleep(5)', { transaction });
    }),
  );
  const params = { collaboration: collaboration.slug };
  const refused = await call(slow, { method: 'POST', headers, params });
  expect([refused.status, (await refused.json()).code]).toEqual([503, 'took-too-long']);
  expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
});

it('asks one statement of a transaction at a time, and goes on after one that fails', async () => {
  const warned = vi.spyOn(process, 'emitWarning');
  const number = (value: number) =>
    database().query<{ value: number }>('select $1::int as value, pg_sleep(0.01)', {
      bind: [value],
      type: QueryTypes.SELECT,
    });
  const values = await inOneTransaction(async () => {
    const rows = await Promise.all([1, 2, 3, 4].map(number));
    return rows.map(([row]) => row.value);
  });
  expect(values).toEqual([1, 2, 3, 4]);
  const failing = inOneTransaction(() =>
    Promise.all([database().query('select 1 / 0'), number(1)]),
  );
  await expect(failing).rejects.toThrow(/division by zero/);
  expect((await number(5))[0].value).toBe(5);
  expect(warned.mock.calls.filter(([words]) => /already executing/.test(String(words)))).toEqual(
    [],
  );
  warned.mockRestore();
});
