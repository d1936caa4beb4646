/**
 * Deleting a collaboration asks of each row that goes whether another still points at it. Without an
 * index each such question reads the whole table that points: minutes for a large collaboration.
 */

const indexes = {
  target_map: 'target(map_id)',
  target_upload: 'target(upload_id)',
  contrast_curve_target: 'contrast_curve(target_id)',
  contrast_curve_upload: 'contrast_curve(upload_id)',
  companion_upload: 'companion(upload_id)',
  run_star_star: 'run_star(star_id)',
  run_star_map: 'run_star(map_id)',
  star_merged_into: 'star(merged_into)',
};

const up = Object.entries(indexes)
  .map(([name, columns]) => `create index ${name} on ${columns};`)
  .join('\n');
const down = `drop index ${Object.keys(indexes).join(', ')};`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
