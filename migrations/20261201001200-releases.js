/**
 * Freezing, releases, links of guests, and runs made anew from a bundle. A frozen run keeps its
 * inputs as the bytes of a bundle, so that what happens to the tables later cannot reach it; a
 * published release keeps every file that it gives out.
 */

/** The kinds of jobs that are known so far, and two more; other migrations may add theirs. */
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
${kindsWith(`kinds || ',''verify-release'',''recreate-run'''`)}

create table frozen_run (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  run_id uuid not null unique,
  reason text,
  checks jsonb not null,
  snapshot bytea not null,
  snapshot_sha256 text not null check (snapshot_sha256 ~ '^[0-9a-f]{64}$'),
  frozen_by uuid references person(id) on delete set null,
  frozen_by_name text not null,
  frozen_at timestamptz not null default now(),
  unique (run_id, collaboration_id),
  unique (id, collaboration_id),
  foreign key (run_id, collaboration_id) references run(id, collaboration_id)
);
create trigger frozen_run_is_final before update on frozen_run
  for each row when (
    (old.run_id, old.reason, old.checks, old.snapshot_sha256, old.frozen_by_name, old.frozen_at)
      is distinct from
        (new.run_id, new.reason, new.checks, new.snapshot_sha256, new.frozen_by_name, new.frozen_at))
  execute function refuse_change();

create table release (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  number integer not null check (number > 0),
  code text not null unique check (code ~ '^[a-z0-9]{10}$'),
  title text not null check (length(title) between 1 and 200),
  authors jsonb not null,
  abstract text not null default '',
  licence text not null,
  note text not null default '',
  replaces_id uuid,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  signed_off_by uuid references person(id) on delete set null,
  signed_off_by_name text,
  signed_off_at timestamptz,
  agreed_by uuid references person(id) on delete set null,
  agreed_by_name text,
  agreed_at timestamptz,
  job_id uuid,
  verification jsonb,
  published_by uuid references person(id) on delete set null,
  published_by_name text,
  published_at timestamptz,
  withdrawn_by_name text,
  withdrawn_at timestamptz,
  withdrawn_reason text,
  unique (collaboration_id, number),
  unique (id, collaboration_id),
  check ((signed_off_by_name is null) = (signed_off_at is null)),
  check ((agreed_by_name is null) = (agreed_at is null)),
  check ((published_by_name is null) = (published_at is null)),
  check ((withdrawn_at is null) = (withdrawn_reason is null)),
  check (published_at is null
    or (signed_off_at is not null and agreed_at is not null and verification is not null)),
  check (withdrawn_at is null or published_at is not null),
  foreign key (replaces_id, collaboration_id) references release(id, collaboration_id),
  foreign key (job_id, collaboration_id) references job(id, collaboration_id)
);
create unique index release_replaced_once on release(replaces_id)
  where replaces_id is not null and published_at is not null;

create table release_run (
  release_id uuid not null,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  run_id uuid not null,
  position integer not null check (position >= 0),
  primary key (release_id, position),
  unique (release_id, run_id),
  foreign key (release_id, collaboration_id) references release(id, collaboration_id) on delete cascade,
  foreign key (run_id, collaboration_id) references frozen_run(run_id, collaboration_id)
);

create table release_file (
  release_id uuid not null,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  position integer not null check (position >= 0),
  name text not null check (length(name) between 1 and 200),
  media_type text not null,
  description text not null,
  sha256 text not null check (sha256 ~ '^[0-9a-f]{64}$'),
  byte_length integer not null check (byte_length >= 0),
  bytes bytea not null,
  primary key (release_id, name),
  foreign key (release_id, collaboration_id) references release(id, collaboration_id) on delete cascade
);
create trigger release_file_is_final before update on release_file
  for each row execute function refuse_change();

create function refuse_release_change() returns trigger language plpgsql as $body$
begin
  raise exception 'a published release does not change';
end
$body$;
create trigger published_release_is_final before update on release
  for each row when (
    old.published_at is not null
    and (old.number, old.code, old.title, old.authors, old.abstract, old.licence, old.note,
         old.replaces_id, old.verification, old.published_at, old.signed_off_by_name,
         old.agreed_by_name)
      is distinct from
        (new.number, new.code, new.title, new.authors, new.abstract, new.licence, new.note,
         new.replaces_id, new.verification, new.published_at, new.signed_off_by_name,
         new.agreed_by_name))
  execute function refuse_release_change();

create table guest_link (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  release_id uuid,
  run_id uuid,
  label text not null check (length(label) between 1 and 100),
  token_hash text not null unique check (token_hash ~ '^[0-9a-f]{64}$'),
  token_ending text not null,
  expires_at timestamptz not null,
  revoked_at timestamptz,
  last_used_at timestamptz,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (id, collaboration_id),
  check ((release_id is null) <> (run_id is null)),
  foreign key (release_id, collaboration_id) references release(id, collaboration_id) on delete cascade,
  foreign key (run_id, collaboration_id) references frozen_run(run_id, collaboration_id) on delete cascade
);

create table guest_note (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  link_id uuid not null,
  name text not null check (length(name) between 1 and 100),
  body text not null check (length(body) between 1 and 10000),
  created_at timestamptz not null default now(),
  foreign key (link_id, collaboration_id) references guest_link(id, collaboration_id) on delete cascade
);
create index guest_note_of_link on guest_note(link_id, created_at);
create trigger guest_note_is_final before update on guest_note
  for each row execute function refuse_change();

create table bundle_import (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  run_id uuid not null,
  file_sha256 text not null check (file_sha256 ~ '^[0-9a-f]{64}$'),
  title text not null,
  expected jsonb not null,
  imported_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (run_id, collaboration_id),
  foreign key (run_id, collaboration_id) references run(id, collaboration_id) on delete cascade
);
`;

const down = `
drop table bundle_import, guest_note, guest_link, release_file, release_run, release, frozen_run;
drop function refuse_release_change();
delete from run where job_id in (select id from job where kind = 'recreate-run');
delete from job where kind in ('verify-release','recreate-run');
${kindsWith(`array_to_string(array_remove(array_remove(string_to_array(kinds, ','),
  '''verify-release'''), '''recreate-run'''), ',')`)}
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
