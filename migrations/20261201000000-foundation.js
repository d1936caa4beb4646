/**
 * The nouns of the foundation. Constraints live here, so that no code path can store what they forbid:
 * every row names its collaboration, and composite foreign keys keep rows of two collaborations apart.
 */

const up = `
create table collaboration (
  id uuid primary key default gen_random_uuid(),
  slug text not null unique check (slug ~ '^[a-z0-9][a-z0-9-]{1,38}$'),
  name text not null check (length(name) between 1 and 100),
  settings jsonb not null default '{}',
  created_at timestamptz not null default now()
);

create table person (
  id uuid primary key default gen_random_uuid(),
  email text not null unique check (email = lower(email)),
  name text not null check (length(name) between 1 and 100),
  password_hash text not null,
  suspended_at timestamptz,
  created_at timestamptz not null default now()
);

create table session (
  id uuid primary key default gen_random_uuid(),
  person_id uuid not null references person(id) on delete cascade,
  user_agent text,
  created_at timestamptz not null default now(),
  last_seen_at timestamptz not null default now(),
  expires_at timestamptz not null
);
create index session_person on session(person_id);

create table member (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  person_id uuid not null references person(id) on delete cascade,
  roles text[] not null check (
    cardinality(roles) > 0
    and roles <@ array['owner','statistician','collaborator','author','student']),
  created_at timestamptz not null default now(),
  unique (collaboration_id, person_id)
);
create index member_person on member(person_id);

create table invitation (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  email text not null check (email = lower(email)),
  roles text[] not null check (
    cardinality(roles) > 0
    and roles <@ array['owner','statistician','collaborator','author','student']),
  code_hash text not null unique,
  invited_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  accepted_at timestamptz,
  revoked_at timestamptz
);
create index invitation_collaboration on invitation(collaboration_id);

create table access_token (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  person_id uuid not null references person(id) on delete cascade,
  name text not null check (length(name) between 1 and 100),
  scopes text[] not null check (cardinality(scopes) > 0 and scopes <@ array['read','write','run']),
  token_hash text not null unique,
  ending text not null,
  created_at timestamptz not null default now(),
  expires_at timestamptz not null,
  last_used_at timestamptz,
  revoked_at timestamptz
);
create index access_token_person on access_token(person_id);

create table survey (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  slug text not null check (slug ~ '^[a-z0-9][a-z0-9-]{0,38}$'),
  name text not null check (length(name) between 1 and 60),
  description text not null default '',
  band text not null,
  observed_from integer,
  observed_to integer,
  lead_id uuid references person(id) on delete set null,
  position integer not null default 0,
  map_settings jsonb not null,
  archived_at timestamptz,
  created_at timestamptz not null default now(),
  unique (collaboration_id, slug),
  unique (id, collaboration_id)
);

create table upload (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  survey_id uuid,
  kind text not null check (
    kind in ('targets','contrast-curves','completeness-maps','companions','cooling-tables')),
  file_name text not null check (length(file_name) between 1 and 200),
  byte_length bigint not null check (byte_length >= 0),
  sha256 text not null check (sha256 ~ '^[0-9a-f]{64}$'),
  state text not null check (state in ('read','stored')),
  settings jsonb not null default '{}',
  report jsonb not null default '{}',
  uploaded_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  stored_at timestamptz,
  unique (id, collaboration_id),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id) on delete cascade
);
create index upload_survey on upload(survey_id, created_at desc);

create table upload_part (
  upload_id uuid not null references upload(id) on delete cascade,
  part_number integer not null check (part_number >= 0),
  bytes bytea not null,
  primary key (upload_id, part_number)
);

create table star (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  name text not null check (length(name) between 1 and 100),
  folded_name text not null,
  gaia_dr3_id text check (gaia_dr3_id ~ '^[0-9]{1,19}$'),
  created_at timestamptz not null default now(),
  unique (collaboration_id, folded_name),
  unique (collaboration_id, gaia_dr3_id),
  unique (id, collaboration_id)
);

create table target (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  survey_id uuid not null,
  star_id uuid not null,
  upload_id uuid,
  name text not null check (length(name) between 1 and 100),
  folded_name text not null,
  other_names text[] not null default '{}',
  gaia_dr3_id text check (gaia_dr3_id ~ '^[0-9]{1,19}$'),
  ra_deg double precision check (ra_deg >= 0 and ra_deg < 360),
  dec_deg double precision check (dec_deg between -90 and 90),
  distance_pc double precision check (distance_pc > 0),
  distance_error_pc double precision check (distance_error_pc >= 0),
  parallax_mas double precision check (parallax_mas > 0),
  parallax_error_mas double precision check (parallax_error_mas >= 0),
  age_myr double precision check (age_myr > 0),
  age_lower_myr double precision check (age_lower_myr > 0),
  age_upper_myr double precision check (age_upper_myr > 0),
  age_min_myr double precision check (age_min_myr > 0),
  age_max_myr double precision check (age_max_myr > 0),
  host_mass_msun double precision check (host_mass_msun > 0),
  spectral_type text,
  moving_group text,
  magnitudes jsonb not null default '{}',
  attributes jsonb not null default '{}',
  left_out_reason text,
  map_id uuid,
  map_state text not null default 'none' check (map_state in ('none','waiting','ready','failed')),
  map_fault text,
  created_at timestamptz not null default now(),
  unique (survey_id, folded_name),
  unique (survey_id, star_id),
  unique (survey_id, gaia_dr3_id),
  unique (id, collaboration_id),
  check ((ra_deg is null) = (dec_deg is null)),
  check (age_lower_myr is null or age_lower_myr <= age_myr),
  check (age_upper_myr is null or age_upper_myr >= age_myr),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id) on delete cascade,
  foreign key (star_id, collaboration_id) references star(id, collaboration_id),
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);
create index target_star on target(star_id);

create table contrast_curve (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  target_id uuid not null,
  upload_id uuid,
  band text not null,
  epoch text,
  n_sigma double precision not null check (n_sigma > 0),
  separation_arcsec double precision[] not null check (cardinality(separation_arcsec) >= 2),
  contrast_mag double precision[] not null,
  coverage double precision[],
  instrument text,
  reference text,
  digest text not null,
  replaced_at timestamptz,
  created_at timestamptz not null default now(),
  check (cardinality(separation_arcsec) = cardinality(contrast_mag)),
  foreign key (target_id, collaboration_id) references target(id, collaboration_id) on delete cascade,
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);
create unique index contrast_curve_current on contrast_curve(target_id, band, coalesce(epoch, ''))
  where replaced_at is null;

create table cooling_table (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  upload_id uuid,
  name text not null check (length(name) between 1 and 100),
  mass_mjup double precision[] not null check (cardinality(mass_mjup) >= 2),
  age_myr double precision[] not null check (cardinality(age_myr) >= 2),
  magnitudes jsonb not null,
  digest text not null,
  created_at timestamptz not null default now(),
  unique (collaboration_id, name),
  unique (id, collaboration_id),
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);

create table completeness_map (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  digest text not null,
  origin text not null check (origin in ('computed','uploaded')),
  engine_version text not null,
  mass_mjup double precision[] not null check (cardinality(mass_mjup) between 2 and 512),
  semi_major_axis_au double precision[] not null check (cardinality(semi_major_axis_au) between 2 and 512),
  scale integer not null default 65535 check (scale = 65535),
  node_values bytea not null,
  checksum text not null check (checksum ~ '^[0-9a-f]{64}$'),
  inputs jsonb not null,
  report jsonb not null default '{}',
  created_at timestamptz not null default now(),
  unique (collaboration_id, digest),
  unique (id, collaboration_id),
  check (octet_length(node_values) = 2 * cardinality(mass_mjup) * cardinality(semi_major_axis_au))
);
alter table completeness_map alter column node_values set compression lz4;
alter table target add foreign key (map_id, collaboration_id)
  references completeness_map(id, collaboration_id);

create table companion (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  target_id uuid not null,
  upload_id uuid,
  name text not null check (length(name) between 1 and 40),
  folded_name text not null,
  status text not null check (status in ('confirmed','candidate','ambiguous','background')),
  mass_mjup double precision check (mass_mjup > 0),
  mass_error_lower_mjup double precision check (mass_error_lower_mjup >= 0),
  mass_error_upper_mjup double precision check (mass_error_upper_mjup >= 0),
  semi_major_axis_au double precision check (semi_major_axis_au > 0),
  semi_major_axis_error_lower_au double precision check (semi_major_axis_error_lower_au >= 0),
  semi_major_axis_error_upper_au double precision check (semi_major_axis_error_upper_au >= 0),
  probability double precision check (probability between 0 and 1),
  attributes jsonb not null default '{}',
  reference text,
  created_at timestamptz not null default now(),
  unique (target_id, folded_name),
  foreign key (target_id, collaboration_id) references target(id, collaboration_id) on delete cascade,
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);

create table population (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  number integer not null check (number > 0),
  version integer not null check (version > 0),
  name text not null check (length(name) between 1 and 100),
  note text not null default '',
  definition jsonb not null,
  digest text not null,
  is_shared boolean not null default false,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (collaboration_id, number, version),
  unique (id, collaboration_id)
);

create table analysis (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  number integer not null check (number > 0),
  name text not null check (length(name) between 1 and 120),
  recipe jsonb not null,
  parent_id uuid,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  updated_at timestamptz not null default now(),
  unique (collaboration_id, number),
  unique (id, collaboration_id),
  foreign key (parent_id, collaboration_id) references analysis(id, collaboration_id)
);

create table job (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  kind text not null check (kind in ('compute-maps','compute-run')),
  survey_id uuid,
  status text not null default 'waiting'
    check (status in ('waiting','running','done','failed','cancelled')),
  payload jsonb not null default '{}',
  attempt_token uuid,
  attempts integer not null default 0,
  worker_id text,
  lease_until timestamptz,
  stage text not null default '',
  done_count integer not null default 0,
  total_count integer not null default 0,
  cancel_requested_at timestamptz,
  fault text,
  requested_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  started_at timestamptz,
  finished_at timestamptz,
  unique (id, collaboration_id),
  check ((status = 'running') = (attempt_token is not null)),
  foreign key (survey_id, collaboration_id) references survey(id, collaboration_id) on delete cascade
);
create index job_open on job(collaboration_id, created_at desc) where status in ('waiting','running');
create unique index job_one_map_job_per_survey on job(survey_id)
  where kind = 'compute-maps' and status in ('waiting','running');

create table run (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  analysis_id uuid not null,
  number integer not null check (number > 0),
  job_id uuid not null unique,
  recipe jsonb not null,
  seed text not null,
  engine_version text not null,
  inputs jsonb,
  inputs_digest text,
  result jsonb,
  result_digest text,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  finished_at timestamptz,
  unique (collaboration_id, analysis_id, number),
  unique (id, collaboration_id),
  check ((result is null) = (result_digest is null)),
  check ((result is null) = (finished_at is null)),
  foreign key (analysis_id, collaboration_id) references analysis(id, collaboration_id) on delete cascade,
  foreign key (job_id, collaboration_id) references job(id, collaboration_id)
);

create table run_star (
  run_id uuid not null references run(id) on delete cascade,
  position integer not null check (position >= 0),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  star_id uuid not null references star(id),
  map_id uuid not null references completeness_map(id),
  survey_ids uuid[] not null,
  mean_completeness double precision not null check (mean_completeness between 0 and 1),
  primary key (run_id, position),
  unique (run_id, star_id)
);

create table worker_heartbeat (
  worker_id text primary key,
  process_id text not null,
  seen_at timestamptz not null default now()
);

create table audit_entry (
  id bigint generated always as identity primary key,
  collaboration_id uuid references collaboration(id) on delete cascade,
  person_id uuid references person(id) on delete set null,
  action text not null,
  item_kind text not null,
  item_id text not null,
  summary text not null default '',
  details jsonb not null default '{}',
  created_at timestamptz not null default now()
);
create index audit_collaboration on audit_entry(collaboration_id, created_at desc);

create function refuse_change() returns trigger language plpgsql as $body$
begin
  raise exception 'rows of % are not changed', tg_table_name;
end
$body$;
create trigger audit_is_insert_only before update on audit_entry
  for each row when (old.person_id is not distinct from new.person_id) execute function refuse_change();

create function refuse_result_change() returns trigger language plpgsql as $body$
begin
  raise exception 'a finished run does not change';
end
$body$;
create trigger run_result_is_final before update on run
  for each row when (
    old.result is not null
    and (old.result, old.recipe, old.inputs, old.seed, old.engine_version)
      is distinct from (new.result, new.recipe, new.inputs, new.seed, new.engine_version))
  execute function refuse_result_change();
`;

const down = `
drop table audit_entry, worker_heartbeat, run_star, run, job, analysis, population, companion,
  contrast_curve, target, completeness_map, cooling_table, star, upload_part, upload, survey,
  access_token, invitation, member, session, person, collaboration;
drop function refuse_change();
drop function refuse_result_change();
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
