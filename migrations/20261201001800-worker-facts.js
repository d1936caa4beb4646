/** What a worker process says of itself, for the owners' page: its threads and its engine. */

const up = `
  alter table worker_heartbeat add column threads integer check (threads > 0);
  alter table worker_heartbeat add column engine_version text;`;
const down = `
  alter table worker_heartbeat drop column engine_version;
  alter table worker_heartbeat drop column threads;`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
