/** The ranks of the rooms: a file imports only from a lower rank, never sideways, never in a circle. */
const rooms = [
  ['quantities', '^lib/(quantities/|errors\\.ts$)', 0],
  ['numerics', '^lib/numerics/', 1],
  ['schemas', '^lib/schemas/', 1],
  ['formats', '^lib/formats/', 1],
  ['sensitivity', '^lib/sensitivity/', 2],
  ['population', '^lib/population/', 2],
  ['inference', '^lib/inference/', 3],
  ['help', '^lib/help/', 3],
  ['config', '^lib/config\\.ts$', 4],
  ['models', '^models/', 4],
  ['access', '^lib/access/', 4],
  ['queue', '^lib/queue/', 5],
  ['mail', '^lib/mail/', 5],
  ['services', '^lib/services/', 6],
  ['workers', '^workers/', 6],
  ['components', '^components/', 7],
  ['app', '^(app/|proxy\\.ts$)', 8],
];

/** Rooms of one rank that may be read by their equals: who holds what is the one exception made for models. */
const allowedSideways = {
  access: ['models', 'config'],
  models: ['config'],
  population: ['sensitivity'],
};

const forbiddenFor = ([name, , rank]) =>
  rooms
    .filter(([other, , otherRank]) => other !== name && otherRank >= rank)
    .filter(([other]) => !(allowedSideways[name] ?? []).includes(other))
    .map(([, path]) => path);

// An empty list of forbidden paths would forbid every path: the highest rank has no such rule.
const rankRules = rooms
  .filter((room) => forbiddenFor(room).length > 0)
  .map((room) => ({
    name: `rank-of-${room[0]}`,
    severity: 'error',
    comment: 'architecture: a room imports only from lower ranks',
    from: { path: room[1] },
    to: { path: forbiddenFor(room) },
  }));

const pure = '^lib/(quantities|numerics|sensitivity|population|inference)/';

module.exports = {
  forbidden: [
    { name: 'no-circles', severity: 'error', from: {}, to: { circular: true } },
    ...rankRules,
    {
      name: 'pure-rooms-import-no-platform',
      severity: 'error',
      from: { path: pure },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'pure-rooms-import-no-package',
      severity: 'error',
      comment: 'numerics/vendor.ts is the one door to numerical packages',
      from: { path: pure, pathNot: '^lib/numerics/vendor\\.ts$' },
      to: { dependencyTypes: ['npm', 'npm-dev'] },
    },
    {
      name: 'components-stay-in-the-browser',
      severity: 'error',
      comment: 'of the formats they may have the two files that only make text',
      from: { path: '^components/' },
      to: {
        path: '^(lib/(config|access|queue|mail|services|formats)|models|workers)',
        pathNot: '^lib/formats/(write-csv|formula-guard)\\.ts$',
      },
    },
    {
      name: 'pages-reach-rows-through-services',
      severity: 'error',
      from: { path: '^app/' },
      to: { path: '^(models|workers|lib/(queue|mail|formats|local))' },
    },
    {
      name: 'launcher-before-install',
      severity: 'error',
      comment: 'it installs the packages, so it can use none but where they are there already',
      from: {
        path: '^lib/local/.*\\.mjs$',
        pathNot: '^lib/local/(compile-kernels|database-copy)\\.mjs$',
      },
      to: { pathNot: '^lib/local/.*\\.mjs$', dependencyTypesNot: ['core'] },
    },
    {
      name: 'nobody-imports-what-stands-in',
      severity: 'error',
      comment: 'lib/local is for one machine; the product runs without it',
      from: { pathNot: '^lib/local/' },
      to: { path: '^lib/local/' },
    },
    {
      name: 'every-import-is-found',
      severity: 'error',
      comment: 'a path that leads nowhere has no rank to check',
      from: {},
      to: { couldNotResolve: true },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    moduleSystems: ['es6', 'cjs'],
    skipAnalysisNotInRules: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
