/** What a cooling table starts from: a fact that decides limits, and that a file rarely states. */

const up = `
alter table cooling_table add column start_condition text not null default 'unstated'
  check (start_condition in ('hot','warm','cold','unstated'));
`;
const down = 'alter table cooling_table drop column start_condition;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
