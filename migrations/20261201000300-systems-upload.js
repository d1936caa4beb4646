/** A file may hold planetary systems; stored, it becomes a version of a population. */

const kinds = (list) => `
alter table upload drop constraint upload_kind_check;
alter table upload add constraint upload_kind_check check (kind in (${list}));
`;

const before = "'targets','contrast-curves','completeness-maps','companions','cooling-tables'";
const up = kinds(`${before},'systems'`);
const down = `delete from upload where kind = 'systems';\n${kinds(before)}`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
