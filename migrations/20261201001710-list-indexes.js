/**
 * Lists and what stands beside each of their rows: without these a list reads whole tables, those of
 * other collaborations too. joined_stars goes the way of root_of_star back, so that rows of a star are
 * found by an index and not by asking each row for its root.
 */

const indexes = {
  target_collaboration_star: 'target(collaboration_id, star_id)',
  // In the order of the list of jobs: open ones first, then the newest.
  job_listed: `job(collaboration_id, (status in ('waiting', 'running')) desc, created_at desc, id desc)`,
  job_maps_of_survey: `job(survey_id, created_at desc) where kind = 'compute-maps'`,
  job_requested: `job(requested_by, kind) where status in ('waiting', 'running')`,
  run_of_analysis: 'run(analysis_id, number desc)',
  companion_collaboration: 'companion(collaboration_id)',
  upload_listed: 'upload(collaboration_id, created_at desc)',
  star_match_collaboration: 'star_match(collaboration_id)',
};

const joinedStars = `
create function joined_stars(root uuid) returns setof uuid language sql stable as $body$
  with recursive joined as (
    select id from star where id = root
    union all select s.id from star s join joined j on s.merged_into = j.id)
  select id from joined
$body$;`;

const up = Object.entries(indexes)
  .map(([name, columns]) => `create index ${name} on ${columns};`)
  .concat(joinedStars)
  .join('\n');
const down = `drop function joined_stars(uuid); drop index ${Object.keys(indexes).join(', ')};`;

/** Called by umzug with { context } and by the command line of Sequelize with the interface itself. */
const run = (sql) => (given) => (given.context ?? given).sequelize.query(sql);

// Two statements, so that the way back is seen by import as well as by require.
exports.up = run(up);
exports.down = run(down);
