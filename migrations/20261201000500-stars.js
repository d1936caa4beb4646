/**
 * One sky: stars that are one are joined and parted again, and adopted ages and distances stand in
 * numbered tables. A joined star keeps its row, so that finished runs and the way back keep theirs.
 */

const up = `
alter table star add column merged_into uuid check (merged_into <> id);
alter table star add foreign key (merged_into, collaboration_id) references star(id, collaboration_id);
alter table target add column star_evidence jsonb;

create function root_of_star(of_star uuid) returns uuid language sql stable as $body$
  with recursive way as (
    select id, merged_into from star where id = of_star
    union all select s.id, s.merged_into from star s join way w on s.id = w.merged_into)
  select id from way where merged_into is null
$body$;

create table star_match (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  first_star_id uuid not null,
  second_star_id uuid not null,
  state text not null check (state in ('proposed','confirmed','refused','undone')),
  evidence jsonb not null,
  absorbed_star_id uuid,
  moved_target_ids uuid[] not null default '{}',
  decided_by uuid references person(id) on delete set null,
  decided_at timestamptz,
  why text,
  created_at timestamptz not null default now(),
  unique (id, collaboration_id),
  unique (first_star_id, second_star_id),
  check (first_star_id < second_star_id),
  check ((state = 'confirmed') = (absorbed_star_id is not null)),
  check ((state = 'proposed') = (decided_at is null)),
  foreign key (first_star_id, collaboration_id) references star(id, collaboration_id) on delete cascade,
  foreign key (second_star_id, collaboration_id) references star(id, collaboration_id) on delete cascade,
  foreign key (absorbed_star_id, collaboration_id) references star(id, collaboration_id) on delete cascade
);
create index star_match_open on star_match(collaboration_id) where state in ('proposed','undone');

create table value_table (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  quantity text not null check (quantity in ('age','distance')),
  number integer not null check (number > 0),
  why text not null,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (collaboration_id, quantity, number),
  unique (id, collaboration_id)
);

create table adopted_value (
  table_id uuid not null,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  star_id uuid not null,
  value jsonb,
  source text not null,
  primary key (table_id, star_id),
  foreign key (table_id, collaboration_id) references value_table(id, collaboration_id) on delete cascade,
  foreign key (star_id, collaboration_id) references star(id, collaboration_id) on delete cascade
);
create index adopted_value_star on adopted_value(star_id);

create trigger value_table_is_final before update on value_table
  for each row when (
    (old.quantity, old.number, old.why, old.created_at)
      is distinct from (new.quantity, new.number, new.why, new.created_at))
  execute function refuse_change();
create trigger adopted_value_is_final before update on adopted_value
  for each row execute function refuse_change();
`;

const down = `
drop table adopted_value, value_table, star_match;
drop function root_of_star(uuid);
alter table target drop column star_evidence;
alter table star drop column merged_into;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
