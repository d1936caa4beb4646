/**
 * Links that open an account for a moment, ORCID iDs, second factors, and members whose access rests.
 * What opens something is stored as a digest, or sealed with the server's secret.
 */

const up = `
create table account_link (
  id uuid primary key default gen_random_uuid(),
  person_id uuid not null references person(id) on delete cascade,
  purpose text not null check (purpose in ('password-reset','sign-in')),
  code_hash text not null unique check (code_hash ~ '^[0-9a-f]{64}$'),
  created_at timestamptz not null default now(),
  expires_at timestamptz not null
);
create index account_link_person on account_link(person_id, purpose);

alter table person add column orcid text unique
  check (orcid ~ '^[0-9]{4}-[0-9]{4}-[0-9]{4}-[0-9]{3}[0-9X]$');

create table second_factor (
  person_id uuid primary key references person(id) on delete cascade,
  sealed_key bytea not null,
  confirmed_at timestamptz,
  last_step bigint,
  created_at timestamptz not null default now()
);

create table recovery_code (
  person_id uuid not null references second_factor(person_id) on delete cascade,
  code_hash text not null check (code_hash ~ '^[0-9a-f]{64}$'),
  primary key (person_id, code_hash)
);

alter table member add column suspended_at timestamptz;
`;

const down = `
alter table member drop column suspended_at;
drop table recovery_code, second_factor;
alter table person drop column orcid;
drop table account_link;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
