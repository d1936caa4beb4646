/**
 * Mail that waits to be sent. A message is stored in the transaction of what causes it, so that
 * neither goes without the other. Its contents may hold a link that opens something: they are
 * sealed with the server's secret, and dropped as soon as the message has gone.
 */

const up = `
create table outbox_message (
  id uuid primary key default gen_random_uuid(),
  collaboration_id uuid references collaboration(id) on delete cascade,
  person_id uuid references person(id) on delete cascade,
  kind text not null check (length(kind) between 1 and 40),
  to_address text not null,
  to_name text not null default '',
  about text not null default '',
  sealed bytea,
  state text not null default 'waiting'
    check (state in ('waiting','sending','sent','failed','withdrawn')),
  attempts integer not null default 0,
  due_at timestamptz not null default now(),
  useless_after timestamptz,
  claim_token uuid,
  claimed_until timestamptz,
  fault text,
  created_at timestamptz not null default now(),
  ended_at timestamptz,
  check ((state = 'sending') = (claim_token is not null)),
  check (state not in ('waiting','sending') or sealed is not null),
  check (state not in ('sent','withdrawn') or sealed is null)
);
create index outbox_due on outbox_message(due_at) where state in ('waiting','sending');
create index outbox_about on outbox_message(about, created_at desc) where about <> '';
create index outbox_failed on outbox_message(collaboration_id, ended_at desc) where state = 'failed';
create unique index outbox_one_digest on outbox_message(collaboration_id, person_id)
  where kind = 'notes' and state = 'waiting' and attempts = 0;

create table mail_preference (
  person_id uuid not null references person(id) on delete cascade,
  kind text not null check (length(kind) between 1 and 40),
  stopped_at timestamptz not null default now(),
  primary key (person_id, kind)
);
`;

const down = `
drop table mail_preference, outbox_message;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
