/**
 * How columns were mapped before, per survey and kind of file; and what each file changed, so that
 * it can be withdrawn. Of files that were stored earlier only what they brought is known, not what
 * it replaced.
 */

const states = (list) => `
alter table upload drop constraint upload_state_check;
alter table upload add constraint upload_state_check check (state in (${list}));
`;

const up = `
create table column_memory (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  survey_id uuid not null,
  kind text not null,
  headings text[] not null check (cardinality(headings) > 0),
  headings_digest text not null,
  column_map jsonb not null,
  kept_by uuid references person(id) on delete set null,
  kept_at timestamptz not null default now(),
  unique (survey_id, kind, headings_digest),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id) on delete cascade
);

${states("'read','stored','withdrawn'")}
alter table upload add column withdrawn_at timestamptz;
alter table upload add column withdrawn_by uuid references person(id) on delete set null;
alter table upload add constraint upload_withdrawn_check
  check ((state = 'withdrawn') = (withdrawn_at is not null));

create table upload_change (
  id bigint generated always as identity primary key,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  upload_id uuid not null,
  item_kind text not null check (item_kind in ('target','map','companion')),
  item_id uuid not null,
  before jsonb,
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id) on delete cascade
);
create index upload_change_upload on upload_change(upload_id);
create index upload_change_item on upload_change(item_id, item_kind);

insert into upload_change (collaboration_id, upload_id, item_kind, item_id)
  select collaboration_id, upload_id, 'target', id from target where upload_id is not null
  union all
  select collaboration_id, upload_id, 'companion', id from companion where upload_id is not null
  union all
  select t.collaboration_id, u.id, 'map', t.id
    from target t join completeness_map m on m.id = t.map_id and m.origin = 'uploaded'
      join upload u on u.id::text = m.inputs->>'uploadId' and u.survey_id = t.survey_id;
`;
const down = `
drop table upload_change, column_memory;
alter table upload drop constraint upload_withdrawn_check;
update upload set state = 'stored' where state = 'withdrawn';
alter table upload drop column withdrawn_at, drop column withdrawn_by;
${states("'read','stored'")}
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
