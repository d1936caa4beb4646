/**
 * Maps that an answer keeps of the run's stars under other ages and cooling models: a stack for each,
 * in the run's order of stars. They never change, as their study does not.
 */

const up = `
create table study_map (
  study_id uuid not null references study(id) on delete cascade,
  stack integer not null check (stack >= 0),
  position integer not null check (position >= 0),
  collaboration_id uuid not null references collaboration(id) on delete cascade,
  map_id uuid not null references completeness_map(id),
  primary key (study_id, stack, position)
);
create index study_map_map on study_map(map_id);
create index study_map_collaboration on study_map(collaboration_id);
create trigger study_map_is_final before update on study_map
  for each row execute function refuse_change();
`;
const down = 'drop table study_map;';

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
