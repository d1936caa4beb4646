/** The request that asked for a job, so that one id leads through the logs of web and worker. */

const up = 'alter table job add column request_id text;';
const down = 'alter table job drop column request_id;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
