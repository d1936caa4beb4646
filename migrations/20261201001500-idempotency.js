/**
 * Answers to writes that carried a key, so that a script which lost one may ask again: a day long,
 * of one person in one collaboration. Without a status the first request is still under way.
 */

const up = `
create table idempotency_key (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  person_id uuid not null references person(id) on delete cascade,
  key text not null check (char_length(key) between 1 and 200),
  fingerprint text not null check (fingerprint ~ '^[0-9a-f]{64}$'),
  status integer check (status between 200 and 299),
  answer text,
  created_at timestamptz not null default now(),
  unique (collaboration_id, person_id, key)
);
create index idempotency_key_created_at on idempotency_key(created_at);
`;

const down = 'drop table idempotency_key;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
