/**
 * Which folder may know about which. Every rule has a reason; a rule nobody can give a reason for is deleted.
 * tests/tools/dependency-rules.test.ts plants one violation of each.
 */
const STAGES = ['decode', 'grid', 'match', 'measure', 'weigh'];
const SOURCES = '^(config|templates|pipeline|simulate|store|worker|report|cli)/';

/** A stage may not import a stage that comes after it on a spectrum's way. */
const stageOrder = STAGES.slice(0, -1).map((stage, i) => ({
  name: `${stage}-not-to-later-stage`,
  severity: 'error',
  comment: `${stage} runs before ${STAGES.slice(i + 1).join(', ')}; it cannot depend on what they hand on.`,
  from: { path: `^pipeline/${stage}/` },
  to: { path: `^pipeline/(${STAGES.slice(i + 1).join('|')})/` },
}));

/** Packages that exactly one place may know, so that changing the package changes that place only. */
const packageDoors = [
  {
    name: 'one-door-to-fits-reader',
    comment:
      'Its faults are fenced in by the strict walk of pipeline/decode/fits; nobody else may meet them.',
    packages: 'fits-reader',
    allowed: '^pipeline/decode/fits/',
  },
  {
    name: 'one-door-to-the-ephemeris',
    comment: 'One folder knows how the Earth moves; the rest is handed velocities.',
    packages: 'astronomy-engine',
    allowed: '^pipeline/measure/',
  },
  {
    name: 'two-doors-to-small-matrices',
    comment: 'Small dense algebra off the hot path: template building and refinement.',
    packages: 'ml-matrix',
    allowed: '^(pipeline/measure|templates)/',
  },
  {
    name: 'one-door-to-the-queue',
    comment: 'Changing the queue library should change one file.',
    packages: 'bullmq|ioredis',
    allowed: '^worker/(queue|pglite-backend)[.]ts$',
  },
  {
    name: 'one-door-to-the-embedded-queue-database',
    comment:
      'Two processes on one PGlite folder lose data without a word: its lock and its pool live together.',
    packages: '@electric-sql/pglite',
    allowed: '^worker/',
  },
  {
    name: 'one-door-to-the-database',
    comment: 'Changing the database driver should change one folder.',
    packages: 'pg|kysely|@photostructure/sqlite',
    allowed: '^store/',
  },
].map(({ name, comment, packages, allowed }) => ({
  name,
  severity: 'error',
  comment,
  from: { pathNot: [allowed, '^(tests|bench)/'] },
  to: { path: `node_modules/(${packages})/` },
}));

module.exports = {
  forbidden: [
    ...stageOrder,
    ...packageDoors,
    {
      name: 'core-knows-nothing',
      severity: 'error',
      comment: 'pipeline/core is arithmetic on typed arrays: no astronomy, no configuration, no packages.',
      from: { path: '^pipeline/core/' },
      to: { pathNot: '^pipeline/core/' },
    },
    {
      name: 'encode-is-a-leaf',
      severity: 'error',
      comment:
        'pipeline/encode turns plain values into bytes; it shares nothing with the reader it is tested by.',
      from: { path: '^pipeline/encode/' },
      to: { pathNot: ['^pipeline/encode/', '^pipeline/errors[.]ts$'] },
    },
    {
      name: 'stages-do-not-write-files',
      severity: 'error',
      comment: 'Writing is for those who keep results; a stage hands on values.',
      from: { path: `^pipeline/(${STAGES.join('|')})/` },
      to: { path: '^pipeline/encode/' },
    },
    {
      name: 'stage-not-to-composition',
      severity: 'error',
      comment: 'pipeline/index.ts puts the stages in order; a stage must not reach up to it.',
      from: { path: '^pipeline/[^/]+/' },
      to: { path: '^pipeline/index[.]ts$' },
    },
    {
      name: 'pure-folders-touch-no-machine',
      severity: 'error',
      comment: 'Same bytes, templates and options in, same answer out: no files, clock, network or threads.',
      from: { path: '^(pipeline|templates|simulate)/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'pure-folders-have-three-packages',
      severity: 'error',
      comment: 'The numbers in a paper should not move because a package did.',
      from: { path: '^(pipeline|templates|simulate)/' },
      to: {
        path: 'node_modules/',
        pathNot: 'node_modules/(fits-reader|ml-matrix|astronomy-engine)/',
      },
    },
    {
      name: 'pipeline-takes-options-and-templates-as-arguments',
      severity: 'error',
      comment:
        'Only their types may be imported, and the list of kinds that stands with them in family.ts; the worker ' +
        'loads the values and passes them in.',
      from: { path: '^pipeline/' },
      to: {
        path: '^(config|templates)/',
        pathNot: '^templates/family[.]ts$',
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'pipeline-not-to-shell',
      severity: 'error',
      comment: 'The pipeline does not know it is run by a queue, kept in a store or shown on a page.',
      from: { path: '^pipeline/' },
      to: { path: '^(simulate|worker|store|report|cli)/' },
    },
    {
      name: 'config-is-a-leaf',
      severity: 'error',
      comment: 'config says what may be chosen; it depends on nothing that is chosen.',
      from: { path: '^config/' },
      to: { path: SOURCES, pathNot: '^config/' },
    },
    {
      name: 'templates-know-arithmetic-and-fits-only',
      severity: 'error',
      comment: 'Families are made before any spectrum is read; a stage they used would judge itself.',
      from: { path: '^templates/' },
      to: {
        path: SOURCES,
        pathNot: [
          '^templates/',
          '^pipeline/(core|encode|decode/fits)/',
          '^pipeline/(errors|decode/byte-source)[.]ts$',
        ],
      },
    },
    {
      name: 'simulate-does-not-use-the-stages',
      severity: 'error',
      comment: 'A practice night made with the code under test would hide that code’s faults.',
      from: { path: '^simulate/' },
      to: {
        path: SOURCES,
        pathNot: ['^(simulate|templates)/', '^pipeline/(core|encode)/'],
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'store-keeps-types-only',
      severity: 'error',
      comment: 'store writes down what the pipeline hands on (types) and runs none of it.',
      from: { path: '^store/' },
      to: { path: '^(pipeline|templates)/', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'store-not-to-shell',
      severity: 'error',
      comment: 'worker and report use store, never the other way about.',
      from: { path: '^store/' },
      to: { path: '^(simulate|worker|report|cli)/' },
    },
    {
      name: 'report-measures-through-one-door',
      severity: 'error',
      comment:
        'A page that measures again can show a number nobody stored; report/refit.ts says when it does.',
      from: { path: '^report/', pathNot: '^report/refit[.]ts$' },
      to: {
        path: '^(pipeline|templates|simulate)/',
        pathNot: '^pipeline/encode/',
        dependencyTypesNot: ['type-only'],
      },
    },
    {
      name: 'report-client-runs-in-a-browser',
      severity: 'error',
      comment:
        'Code sent to the browser imports only itself and the chart library; store rows reach it as types.',
      from: { path: '^report/client/' },
      to: { pathNot: ['^report/client/', 'node_modules/uplot/'], dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'nobody-imports-the-worker',
      severity: 'error',
      comment: 'worker is where things are run from; only the command and the tests start it.',
      from: { pathNot: '^(worker|cli|tests|bench)/' },
      to: { path: '^worker/' },
    },
    {
      name: 'worker-not-to-pages',
      severity: 'error',
      comment: 'Measuring must go on where no page is ever made.',
      from: { path: '^worker/' },
      to: { path: '^(report|cli)/' },
    },
    {
      name: 'nobody-imports-the-command',
      severity: 'error',
      comment: 'cli is the outermost layer.',
      from: { pathNot: '^(cli|tests|bench)/' },
      to: { path: '^cli/' },
    },
    {
      name: 'not-to-tests',
      severity: 'error',
      comment: 'Tests and benches use the code, never the reverse.',
      from: { pathNot: '^(tests|bench)/' },
      to: { path: '^(tests|bench)/' },
    },
    {
      name: 'no-circular',
      severity: 'error',
      comment: 'A cycle has no top to read down from.',
      from: {},
      to: { circular: true },
    },
    {
      name: 'no-orphans',
      severity: 'error',
      comment: 'Code nothing reaches is deleted; git keeps it.',
      from: { orphan: true, path: SOURCES, pathNot: '[.]d[.]ts$' },
      to: {},
    },
    {
      name: 'not-to-unresolvable',
      severity: 'error',
      comment: 'An import that resolves to nothing is a broken build.',
      from: {},
      to: { couldNotResolve: true },
    },
    {
      name: 'not-to-dev-dependency',
      severity: 'error',
      comment: 'What runs in production must be installed in production.',
      from: { path: SOURCES },
      to: { dependencyTypes: ['npm-dev'], dependencyTypesNot: ['type-only'] },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    // Without this the type-only rules see nothing: types are gone after compilation.
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
  },
};
