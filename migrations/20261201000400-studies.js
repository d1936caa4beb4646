/**
 * Further questions of a finished run. A study is as final as the run that it rests on; its parts
 * are what a long computation has done so far, so that a killed worker loses only the part it was at.
 */

const up = `
alter table job drop constraint job_kind_check;
alter table job add constraint job_kind_check
  check (kind in ('compute-maps','compute-run','compute-study'));

create table study (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  run_id uuid not null,
  number integer not null check (number > 0),
  job_id uuid not null unique,
  kind text not null,
  settings jsonb not null,
  settings_digest text not null,
  seed text not null,
  engine_version text not null,
  inputs jsonb,
  inputs_digest text,
  result jsonb,
  result_digest text,
  headline text,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  finished_at timestamptz,
  unique (collaboration_id, run_id, number),
  unique (id, collaboration_id),
  check (settings->>'kind' = kind),
  check ((result is null) = (result_digest is null)),
  check ((result is null) = (finished_at is null)),
  check ((result is null) = (headline is null)),
  foreign key (run_id, collaboration_id) references run(id, collaboration_id) on delete cascade,
  foreign key (job_id, collaboration_id) references job(id, collaboration_id)
);
create index study_of_run on study(run_id, number desc);
create index study_of_kind on study(collaboration_id, kind, created_at desc);

create table study_part (
  study_id uuid not null references study(id) on delete cascade,
  part integer not null check (part >= 0),
  result jsonb not null,
  created_at timestamptz not null default now(),
  primary key (study_id, part)
);

create function refuse_study_change() returns trigger language plpgsql as $body$
begin
  raise exception 'a finished study does not change';
end
$body$;
create trigger study_result_is_final before update on study
  for each row when (
    old.result is not null
    and (old.result, old.settings, old.inputs, old.seed, old.engine_version, old.headline)
      is distinct from
        (new.result, new.settings, new.inputs, new.seed, new.engine_version, new.headline))
  execute function refuse_study_change();
create trigger study_part_is_final before update on study_part
  for each row execute function refuse_change();
`;

const down = `
drop table study_part, study;
drop function refuse_study_change();
delete from job where kind = 'compute-study';
alter table job drop constraint job_kind_check;
alter table job add constraint job_kind_check check (kind in ('compute-maps','compute-run'));
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
