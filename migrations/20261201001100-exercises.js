/**
 * Analyses set as exercises: who began one with which draft, and what was handed in. A submission
 * keeps the run that it names; only what was said about it may be added.
 */

const up = `
create table exercise (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  number integer not null check (number > 0),
  title text not null check (length(title) between 1 and 120),
  task text not null check (length(task) between 1 and 4000),
  may_change text[] not null,
  due_on date,
  is_shared boolean not null default false,
  run_id uuid not null,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  updated_at timestamptz not null default now(),
  unique (collaboration_id, number),
  unique (id, collaboration_id),
  foreign key (run_id, collaboration_id) references run(id, collaboration_id) on delete cascade
);
create trigger exercise_reference_is_final before update on exercise
  for each row when ((old.number, old.run_id) is distinct from (new.number, new.run_id))
  execute function refuse_change();

create table exercise_start (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  exercise_id uuid not null,
  person_id uuid not null references person(id) on delete cascade,
  analysis_id uuid not null,
  started_at timestamptz not null default now(),
  unique (exercise_id, person_id),
  unique (id, collaboration_id),
  foreign key (exercise_id, collaboration_id)
    references exercise(id, collaboration_id) on delete cascade,
  foreign key (analysis_id, collaboration_id)
    references analysis(id, collaboration_id) on delete cascade
);
create index exercise_start_of_analysis on exercise_start(analysis_id);

create table exercise_submission (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  start_id uuid not null,
  number integer not null check (number > 0),
  run_id uuid not null,
  remark text not null default '' check (length(remark) <= 2000),
  submitted_at timestamptz not null default now(),
  comment text check (length(comment) between 1 and 4000),
  commented_by uuid references person(id) on delete set null,
  commented_at timestamptz,
  unique (start_id, number),
  unique (start_id, run_id),
  unique (id, collaboration_id),
  check ((comment is null) = (commented_at is null)),
  foreign key (start_id, collaboration_id)
    references exercise_start(id, collaboration_id) on delete cascade,
  foreign key (run_id, collaboration_id) references run(id, collaboration_id) on delete cascade
);
create trigger exercise_submission_is_final before update on exercise_submission
  for each row when (
    (old.start_id, old.number, old.run_id, old.remark, old.submitted_at)
      is distinct from (new.start_id, new.number, new.run_id, new.remark, new.submitted_at))
  execute function refuse_change();
`;

const down = 'drop table exercise_submission, exercise_start, exercise;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
