/**
 * The copy of a release in an open repository. Each step of sending it is kept as soon as it is
 * done, so that whoever goes on after a crash begins with the next one.
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
${kindsWith(`kinds || ',''deposit-release'''`)}

create table deposit (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  release_id uuid not null unique,
  job_id uuid not null unique,
  remote_id text check (length(remote_id) between 1 and 200),
  doi text check (doi ~ '^10\\.[0-9]{4,9}/'),
  address text,
  uploaded jsonb not null default '[]',
  asked_by uuid references person(id) on delete set null,
  asked_by_name text not null,
  created_at timestamptz not null default now(),
  published_at timestamptz,
  unique (id, collaboration_id),
  check (published_at is null or (remote_id is not null and doi is not null)),
  foreign key (release_id, collaboration_id) references release(id, collaboration_id) on delete cascade,
  foreign key (job_id, collaboration_id) references job(id, collaboration_id)
);
`;

const down = `
drop table deposit;
delete from job where kind = 'deposit-release';
${kindsWith(`array_to_string(array_remove(string_to_array(kinds, ','),
  '''deposit-release'''), ',')`)}
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
