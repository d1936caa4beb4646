/**
 * What was seen of a candidate at each epoch, and what was decided about it, by whom and why. A
 * verdict is never changed: the newest that is no proposal stands in the row of the companion.
 */

const up = `
alter table companion add unique (id, collaboration_id);

create table companion_observation (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  companion_id uuid not null,
  upload_id uuid,
  observed_on date not null check (observed_on between '1950-01-01' and '2049-12-31'),
  separation_arcsec double precision not null check (separation_arcsec > 0),
  separation_error_arcsec double precision check (separation_error_arcsec > 0),
  position_angle_deg double precision not null
    check (position_angle_deg >= 0 and position_angle_deg < 360),
  position_angle_error_deg double precision check (position_angle_error_deg > 0),
  band text,
  contrast_mag double precision check (contrast_mag >= 0),
  contrast_error_mag double precision check (contrast_error_mag >= 0),
  source text,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  foreign key (companion_id, collaboration_id)
    references companion(id, collaboration_id) on delete cascade,
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);
create unique index companion_observation_once
  on companion_observation(companion_id, observed_on, coalesce(band, ''));

create table companion_verdict (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  companion_id uuid not null,
  number integer not null check (number > 0),
  is_proposal boolean not null default false,
  status text not null check (status in ('confirmed','candidate','ambiguous','background')),
  probability double precision check (probability between 0 and 1),
  mass_mjup double precision check (mass_mjup > 0),
  mass_error_lower_mjup double precision check (mass_error_lower_mjup >= 0),
  mass_error_upper_mjup double precision check (mass_error_upper_mjup >= 0),
  mass_from text,
  semi_major_axis_au double precision check (semi_major_axis_au > 0),
  semi_major_axis_error_lower_au double precision check (semi_major_axis_error_lower_au >= 0),
  semi_major_axis_error_upper_au double precision check (semi_major_axis_error_upper_au >= 0),
  semi_major_axis_from text,
  reason text not null check (length(reason) between 1 and 2000),
  upload_id uuid,
  created_by uuid references person(id) on delete set null,
  created_at timestamptz not null default now(),
  unique (companion_id, number),
  foreign key (companion_id, collaboration_id)
    references companion(id, collaboration_id) on delete cascade,
  foreign key (upload_id, collaboration_id) references upload(id, collaboration_id)
);
create trigger companion_verdict_is_final before update on companion_verdict
  for each row when (old.created_by is not distinct from new.created_by)
  execute function refuse_change();

insert into companion_verdict (collaboration_id, companion_id, number, status, probability,
    mass_mjup, mass_error_lower_mjup, mass_error_upper_mjup, mass_from,
    semi_major_axis_au, semi_major_axis_error_lower_au, semi_major_axis_error_upper_au,
    semi_major_axis_from, reason, upload_id, created_by, created_at)
  select c.collaboration_id, c.id, 1, c.status, c.probability,
    c.mass_mjup, c.mass_error_lower_mjup, c.mass_error_upper_mjup,
    case when c.mass_mjup is not null then 'file' end,
    c.semi_major_axis_au, c.semi_major_axis_error_lower_au, c.semi_major_axis_error_upper_au,
    case when c.semi_major_axis_au is not null then 'file' end,
    'As the file of companions states it', c.upload_id, u.uploaded_by, c.created_at
  from companion c left join upload u on u.id = c.upload_id;
`;

const down = `
drop table companion_verdict, companion_observation;
alter table companion drop constraint companion_id_collaboration_id_key;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
