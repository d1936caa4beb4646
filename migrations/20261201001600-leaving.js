/**
 * Leaving: a collaboration as one archive, its deletion after a time in which it can be taken back,
 * and what remains afterwards. The last two tables name no collaboration that exists: they tell that
 * there was one, and what became of addresses that others cite.
 */

/** The kinds of jobs that are known so far, and one more; other migrations may add theirs. */
const kindsWith = (added) => `
do $body$
declare kinds text;
begin
  select string_agg(distinct quote_literal(named.parts[1]), ',') into kinds
    from pg_constraint, regexp_matches(pg_get_constraintdef(oid), '''([a-z-]+)''', 'g') as named(parts)
    where conname = 'job_kind_check' and conrelid = 'job'::regclass;
  alter table job drop constraint job_kind_check;
  execute 'alter table job add constraint job_kind_check check (kind in (' || ${added} || '))';
end
$body$;
`;

const up = `
${kindsWith(`kinds || ',''export-collaboration'''`)}

create table collaboration_export (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  job_id uuid not null unique,
  asked_by uuid references person(id) on delete set null,
  asked_by_name text not null,
  created_at timestamptz not null default now(),
  finished_at timestamptz,
  expires_at timestamptz,
  byte_length bigint check (byte_length >= 0),
  sha256 text check (sha256 ~ '^[0-9a-f]{64}$'),
  unique (id, collaboration_id),
  check ((finished_at is null) = (expires_at is null)),
  check ((finished_at is null) = (sha256 is null)),
  check ((finished_at is null) = (byte_length is null)),
  foreign key (job_id, collaboration_id) references job(id, collaboration_id)
);

create table collaboration_export_part (
  export_id uuid not null,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  part_number integer not null check (part_number >= 0),
  bytes bytea not null,
  primary key (export_id, part_number),
  foreign key (export_id, collaboration_id)
    references collaboration_export(id, collaboration_id) on delete cascade
);
alter table collaboration_export_part alter column bytes set storage external;

create table departure (
  collaboration_id uuid primary key references collaboration(id) on delete cascade,
  asked_by uuid references person(id) on delete set null,
  asked_by_name text not null,
  asked_at timestamptz not null default now(),
  due_at timestamptz not null,
  check (due_at > asked_at)
);
create index departure_due on departure(due_at);

create table deleted_collaboration (
  id uuid primary key,
  asked_at timestamptz not null,
  deleted_at timestamptz not null default now(),
  asked_by uuid references person(id) on delete set null
);
create trigger deleted_collaboration_is_final before update or delete on deleted_collaboration
  for each row when (pg_trigger_depth() = 0) execute function refuse_change();

create table release_tombstone (
  code text primary key check (code ~ '^[a-z0-9]{10}$'),
  number integer not null check (number > 0),
  title text not null,
  doi text,
  published_at timestamptz not null,
  removed_at timestamptz not null default now()
);
create trigger release_tombstone_is_final before update or delete on release_tombstone
  for each row when (pg_trigger_depth() = 0) execute function refuse_change();
`;

const down = `
drop table release_tombstone, deleted_collaboration, departure, collaboration_export_part,
  collaboration_export;
delete from job where kind = 'export-collaboration';
${kindsWith(`array_to_string(array_remove(string_to_array(kinds, ','),
  '''export-collaboration'''), ',')`)}
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
