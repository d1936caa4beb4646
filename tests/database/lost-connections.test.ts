import { expect, it } from 'vitest';
import {
  GET as readTeam,
  PATCH as rename,
} from '@/app/api/v1/collaborations/[collaboration]/route';
import { withDatabase } from '../support/database';
import { bearer, call, createCollaborationWith, tokenOf } from '../support/people';

const { query } = withDatabase();

/** Ends every connection that others hold to this file's database. */
const endAll = () =>
  query(`select pg_terminate_backend(pid) from pg_stat_activity
          where datname = current_database() and pid <> pg_backend_pid()
            and backend_type = 'client backend'`);

it('requests work again once every connection was ended, and writes are there or not', async () => {
  const { collaboration, people } = await createCollaborationWith(['owner']);
  const headers = bearer(await tokenOf(people.owner, collaboration));
  const params = { collaboration: collaboration.slug };
  const read = () => call(readTeam, { headers, params });
  const write = (name: string) =>
    call(rename, { method: 'PATCH', headers, params, body: { name } });
  await Promise.all(Array.from({ length: 8 }, read));

  for (let round = 0; round < 3; round++) {
    const name = `Round ${round}`;
    const during = Promise.all(
      Array.from({ length: 8 }, (_, i) => (i === 0 ? write(name) : read())),
    );
    await endAll();
    const [written, ...reads] = await during;
    // Reads are asked once more; a second loss, or a write, says that the database was away.
    for (const { status } of [written, ...reads]) expect([200, 503]).toContain(status);
    const end = Date.now() + 2000;
    let status = 0;
    while (status !== 200 && Date.now() < end) ({ status } = await read());
    expect(status).toBe(200);
    for (let i = 0; i < 8; i++) expect((await read()).status).toBe(200);
    if (written.status === 200) expect((await (await read()).json()).name).toBe(name);
  }
});
