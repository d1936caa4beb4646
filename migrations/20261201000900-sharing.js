/**
 * A survey offered to another collaboration, and what became of the offer. What is used there is a
 * copy, made when it is accepted and kept in the receiver's own rows: no read of one collaboration
 * ever reaches into another, and a run of the receiver stays whole whatever the owner does later.
 */

const up = `
alter table collaboration add column sharing_code text not null unique
  default right(gen_random_uuid()::text, 12);

create table share (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid references collaboration(id) on delete set null,
  survey_id uuid,
  receiver_id uuid not null references collaboration(id) on delete cascade,
  scope text not null check (scope in ('whole','maps')),
  owner_name text not null,
  survey_name text not null,
  note text not null default '' check (length(note) <= 1000),
  attribution text not null check (length(attribution) between 1 and 500),
  state text not null default 'offered'
    check (state in ('offered','accepted','refused','expired','withdrawn')),
  offered_by uuid references person(id) on delete set null,
  offered_at timestamptz not null default now(),
  expires_at timestamptz not null,
  decided_by uuid references person(id) on delete set null,
  decided_at timestamptz,
  decided_why text,
  source_version text,
  copied_at timestamptz,
  withdrawn_by uuid references person(id) on delete set null,
  withdrawn_at timestamptz,
  withdrawn_from timestamptz,
  withdrawn_why text,
  unique (id, receiver_id),
  check (collaboration_id <> receiver_id),
  check (state <> 'accepted' or source_version is not null),
  check ((state = 'withdrawn') = (withdrawn_from is not null)),
  check ((withdrawn_from is null) = (withdrawn_why is null)),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id)
    on delete set null
);
create index share_receiver on share(receiver_id);
create unique index share_standing on share(survey_id, receiver_id)
  where state in ('offered','accepted');

alter table survey add column share_id uuid unique;
alter table survey add foreign key (share_id, collaboration_id) references share(id, receiver_id);

-- A survey whose owner has taken it back: nothing new may rest on it.
create function is_withdrawn(of_share uuid) returns boolean language sql stable as $body$
  select exists (select 1 from share where id = of_share and withdrawn_from <= now())
$body$;
`;

const down = `
drop function is_withdrawn(uuid);
alter table survey drop column share_id;
drop table share;
alter table collaboration drop column sharing_code;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
