/**
 * Attempts are counted in a table that need not survive a crash. The log can only grow: a row goes
 * away with its collaboration, never by a statement of its own.
 */

const up = `
create unlogged table rate_limit (
  key varchar(255) primary key,
  points integer not null default 0,
  expire bigint
);

create trigger audit_is_never_deleted before delete on audit_entry
  for each row when (pg_trigger_depth() = 0) execute function refuse_change();

drop trigger audit_is_insert_only on audit_entry;
create trigger audit_is_insert_only before update on audit_entry
  for each row when (pg_trigger_depth() = 0) execute function refuse_change();
`;

const down = `
drop trigger audit_is_insert_only on audit_entry;
create trigger audit_is_insert_only before update on audit_entry
  for each row when (old.person_id is not distinct from new.person_id) execute function refuse_change();
drop trigger audit_is_never_deleted on audit_entry;
drop table rate_limit;
`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
