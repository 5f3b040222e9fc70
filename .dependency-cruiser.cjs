/**
 * Who may import whom; DEVELOPERS.md says why. tests/unit/infra/layers.test.ts proves that each rule bites.
 * Type-only imports count: a type is a dependency too.
 */
const product = '^(app|components|lib|db|storage|worker)/|^proxy\\.ts$';
const testPackages =
  '^node_modules/(vitest|vite|@playwright|playwright|@testing-library|@axe-core|fast-check|jsdom|yazl|s3rver|smtp-server|mailparser|tsx)(/|$)';
const enginePackages =
  '^node_modules/(ml-matrix|ml-regression-multivariate-linear|ml-cross-validation|pure-rand|@stdlib)/';

/** `packages` may be imported only under `home`. Tools and tests are free: they check or set up what is behind. */
const onlyIn = (name, packages, home, comment) => ({
  name,
  comment,
  severity: 'error',
  from: { path: product, pathNot: home },
  to: { path: `^node_modules/(${packages})(/|$)` },
});

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    {
      name: 'engine-is-pure',
      comment: 'Arrays in, numbers out: nothing of ours, nothing of Node, and only numeric packages.',
      severity: 'error',
      from: { path: '^lib/engine/' },
      to: { pathNot: ['^lib/engine/', enginePackages] },
    },
    {
      name: 'contracts-know-only-zod',
      comment: 'Browser, server, worker and the OpenAPI document share them.',
      severity: 'error',
      from: { path: '^lib/contracts/' },
      to: { pathNot: ['^lib/contracts/', '^node_modules/zod/'] },
    },
    {
      name: 'components-stay-in-the-browser',
      comment:
        'Components see contracts, format, client and each other; data come in as props or through lib/client.',
      severity: 'error',
      from: { path: '^components/' },
      to: {
        path: '^(app|lib|db|storage|worker|scripts)/',
        pathNot: '^lib/(contracts|format|client)/',
      },
    },
    {
      name: 'browser-helpers-stay-in-the-browser',
      comment: 'lib/client and lib/format are sent to the browser.',
      severity: 'error',
      from: { path: '^lib/(client|format)/' },
      to: {
        path: '^(app|components|lib|db|storage|worker|scripts)/',
        pathNot: '^lib/(contracts|format|client|errors)/',
      },
    },
    {
      name: 'no-node-in-the-browser',
      comment: 'A Node module in the browser part would end up in the bundle or break it.',
      severity: 'error',
      from: { path: '^(components|lib/(client|format|contracts))/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'doors-go-through-services',
      comment:
        'Pages and route handlers call verbs of lib/services; they never reach the adapters or the engine.',
      severity: 'error',
      from: { path: '^app/|^proxy\\.ts$' },
      to: { path: '^(db|storage|worker)/|^lib/(engine|native|mail)/' },
    },
    {
      name: 'adapters-are-strangers',
      comment: 'Database, object store, jobs and mail do not know each other; services compose them.',
      severity: 'error',
      from: { path: '^(db|storage|lib/jobs|lib/mail)/' },
      to: { path: '^(db|storage|lib/jobs|lib/mail)/', pathNot: '^$1/' },
    },
    {
      name: 'pure-parts-are-pure',
      comment: 'Policy, reports and errors decide and build; they fetch nothing.',
      severity: 'error',
      from: { path: '^lib/(policy|reports|errors)/' },
      to: {
        path: '^(app|components|db|storage|worker)/|^lib/(services|http|auth|audit|jobs|mail|env|log|native)/',
      },
    },
    {
      name: 'adapters-know-no-verb',
      comment: 'Services call adapters, readers and the audit trail, never the other way round.',
      severity: 'error',
      from: { path: '^(lib/(audit|intake|native|jobs|mail)|db|storage)/' },
      to: { path: '^lib/(services|http|client|auth)/|^components/', pathNot: '^lib/services/context\\.ts$' },
    },
    {
      name: 'nobody-imports-the-app',
      severity: 'error',
      from: { pathNot: '^(app|tests)/' },
      to: { path: '^app/|^proxy\\.ts$' },
    },
    {
      name: 'nobody-imports-the-worker',
      comment: 'Tests and benchmarks may measure its parts.',
      severity: 'error',
      from: { pathNot: '^(worker|tests|scripts/bench)/' },
      to: { path: '^worker/' },
    },
    {
      name: 'no-tools-or-tests-in-the-product',
      severity: 'error',
      from: { path: product },
      to: { path: ['^(tests|scripts)/', testPackages] },
    },
    {
      name: 'server-only-inside-app',
      comment: 'It throws in plain Node, so the worker and the tests could not load what imports it.',
      severity: 'error',
      from: { pathNot: '^app/' },
      to: { path: '^(node_modules/)?server-only' },
    },
    onlyIn('sql-only-in-db', 'knex|mysql2', '^db/'),
    onlyIn('s3-only-in-storage', '@aws-sdk|@smithy', '^storage/'),
    onlyIn('queue-only-in-jobs', 'bullmq|ioredis', '^lib/jobs/'),
    onlyIn('smtp-only-in-mail', 'nodemailer', '^lib/mail/'),
    onlyIn('foreign-functions-only-in-native', 'koffi', '^lib/native/'),
    onlyIn('plots-only-in-charts', 'uplot', '^components/charts/'),
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true },
    },
    {
      name: 'everything-resolves',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^(dist|\\.next|\\.data|coverage|test-results)/' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
      extensions: ['.ts', '.tsx', '.d.ts', '.mts', '.mjs', '.js', '.cjs', '.json', '.css'],
    },
    moduleSystems: ['es6', 'cjs'],
  },
};
