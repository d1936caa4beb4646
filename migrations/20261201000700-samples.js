/**
 * Saved selections of stars, and saved combinations of surveys. A version never changes: whoever
 * reads a run must find the selection that it was made with.
 */

const table = (name) => `
create table ${name} (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  number integer not null check (number > 0),
  version integer not null check (version > 0),
  name text not null check (length(name) between 1 and 100),
  definition jsonb not null,
  digest text not null,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (collaboration_id, number, version),
  unique (id, collaboration_id)
);
create trigger ${name}_version_is_final before update on ${name}
  for each row when (
    (old.number, old.version, old.name, old.definition, old.digest)
      is distinct from (new.number, new.version, new.name, new.definition, new.digest))
  execute function refuse_change();
`;

const up = `${table('sample')}${table('combination')}`;
const down = 'drop table combination, sample;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
