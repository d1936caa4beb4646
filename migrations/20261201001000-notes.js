/**
 * What people say about a survey, a star, an analysis, a run or a candidate. Each note hangs on
 * exactly one of them, within its collaboration. A removed note leaves its row without its words.
 * The log learns from which address a request came, and that it cannot be emptied at one stroke.
 */

const up = `
create table note (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  survey_id uuid,
  star_id uuid,
  analysis_id uuid,
  run_id uuid,
  companion_id uuid,
  parent_id uuid,
  body text not null check (length(body) <= 4000),
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  edited_at timestamptz,
  removed_at timestamptz,
  resolved_at timestamptz,
  resolved_by uuid references person(id) on delete set null,
  unique (id, collaboration_id),
  constraint note_on_one_item
    check (num_nonnulls(survey_id, star_id, analysis_id, run_id, companion_id) = 1),
  check ((removed_at is null) = (body <> '')),
  check (parent_id is null or resolved_at is null),
  check (resolved_by is null or resolved_at is not null),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id) on delete cascade,
  foreign key (star_id, collaboration_id) references star(id, collaboration_id) on delete cascade,
  foreign key (analysis_id, collaboration_id) references analysis(id, collaboration_id) on delete cascade,
  foreign key (run_id, collaboration_id) references run(id, collaboration_id) on delete cascade,
  foreign key (companion_id, collaboration_id) references companion(id, collaboration_id) on delete cascade,
  foreign key (parent_id, collaboration_id) references note(id, collaboration_id) on delete cascade
);
create index note_survey on note(survey_id) where survey_id is not null;
create index note_star on note(star_id) where star_id is not null;
create index note_analysis on note(analysis_id) where analysis_id is not null;
create index note_run on note(run_id) where run_id is not null;
create index note_companion on note(companion_id) where companion_id is not null;
create index note_parent on note(parent_id) where parent_id is not null;

create table note_mention (
  note_id uuid not null,
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  person_id uuid not null references person(id) on delete cascade,
  name text not null,
  primary key (note_id, person_id),
  foreign key (note_id, collaboration_id) references note(id, collaboration_id) on delete cascade
);
create index note_mention_person on note_mention(person_id, collaboration_id);

create table note_visit (
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  person_id uuid not null references person(id) on delete cascade,
  item_kind text not null check (item_kind in ('survey','star','analysis','run','candidate')),
  item_id uuid not null,
  seen_at timestamptz not null default clock_timestamp(),
  primary key (collaboration_id, person_id, item_kind, item_id),
  foreign key (collaboration_id, person_id)
    references member(collaboration_id, person_id) on delete cascade
);

alter table collaboration add column archived_at timestamptz;

alter table audit_entry add column address text check (length(address) <= 45);
create index audit_item on audit_entry(collaboration_id, item_id);
create trigger audit_is_never_emptied before truncate on audit_entry
  for each statement execute function refuse_change();
`;

const down = `
drop trigger audit_is_never_emptied on audit_entry;
drop index audit_item;
alter table audit_entry drop column address;
alter table collaboration drop column archived_at;
drop table note_visit, note_mention, note;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
