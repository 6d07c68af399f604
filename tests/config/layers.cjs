/** Layer rules for the whole repository. See DEVELOPERS.md, "Which way imports point". */
const SERVER_LIB = '^lib/(access|auth|audit|storage|mail|exports)/|^lib/uploads/(receive-multipart|read-job)'
/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      comment: 'A cycle means two files are one idea, or one is in the wrong layer.',
      from: {},
      to: { circular: true },
    },
    {
      name: 'no-orphans',
      severity: 'warn',
      from: {
        orphan: true,
        pathNot:
          '(\\.d\\.ts$|^tests/|\\.config\\.|^app/.*(page|layout|route|loading|error|not-found|global-error|template|default)\\.tsx?$|^db/(migrate|seed)\\.ts$)',
      },
      to: {},
    },
    {
      name: 'analysis-is-pure',
      severity: 'error',
      comment: 'Numbers in, numbers out: pure numeric packages only, no Node, no other layer.',
      from: { path: '^lib/analysis/' },
      to: { pathNot: '^lib/analysis/|^node_modules/(regression|@stdlib|ml-matrix|ml-levenberg-marquardt)/' },
    },
    {
      name: 'domain-knows-only-zod-and-analysis',
      severity: 'error',
      from: { path: '^lib/domain/' },
      to: { pathNot: '^lib/(domain|analysis)/|^node_modules/zod/' },
    },
    {
      name: 'policy-knows-only-domain',
      severity: 'error',
      from: { path: '^lib/policy/' },
      to: { pathNot: '^lib/(policy|domain)/' },
    },
    {
      name: 'parsing-is-independent',
      severity: 'error',
      comment: 'Profiles and parsers turn bytes into rows; they do not store or authorise.',
      from: { path: '^lib/uploads/' },
      to: { path: '^(app|components|db)/|^lib/(access|auth|audit|storage|mail|policy)/' },
    },
    {
      name: 'uploads-use-units-not-analysis',
      severity: 'error',
      from: { path: '^lib/uploads/' },
      to: { path: '^lib/analysis/', pathNot: '^lib/analysis/units/' },
    },
    {
      name: 'db-knows-only-domain',
      severity: 'error',
      from: { path: '^db/' },
      to: { path: '^(app|components)/|^lib/(?!domain/|environment\\.ts)' },
    },
    {
      name: 'only-db-speaks-sql',
      severity: 'error',
      from: { pathNot: '^(db|tests)/|^drizzle\\.config\\.ts$' },
      to: { path: '^node_modules/(drizzle-orm|@electric-sql/pglite|pg|pg-copy-streams)/' },
    },
    {
      name: 'only-access-reaches-db',
      severity: 'error',
      from: { pathNot: '^(db|lib/access|tests|scripts)/|^instrumentation-node|^drizzle\\.config\\.ts$' },
      to: { path: '^db/' },
    },
    {
      name: 'components-stay-in-the-browser',
      severity: 'error',
      from: { path: '^components/' },
      to: { path: '^(app|db)/|' + SERVER_LIB },
    },
    {
      name: 'components-reach-no-server-only-module',
      severity: 'error',
      from: { path: '^components/' },
      to: { path: '^node_modules/server-only/', reachable: true },
    },
    {
      name: 'one-session-reader',
      severity: 'error',
      from: { pathNot: '^lib/auth/|^tests/' },
      to: { path: '^node_modules/iron-session/' },
    },
    {
      name: 'one-multipart-reader',
      severity: 'error',
      from: { pathNot: '^lib/uploads/receive-multipart\\.ts$' },
      to: { path: '^node_modules/(@types/)?formidable/' },
    },
    {
      name: 'grids-only-in-grids',
      severity: 'error',
      from: { pathNot: '^components/grids/' },
      to: { path: '^node_modules/ag-grid-' },
    },
    {
      name: 'charts-only-in-charts',
      severity: 'error',
      from: { pathNot: '^components/charts/' },
      to: { path: '^node_modules/echarts/' },
    },
    { name: 'nobody-imports-tests', severity: 'error', from: { pathNot: '^tests/' }, to: { path: '^tests/' } },
  ],
  options: {
    doNotFollow: { path: '^node_modules' },
    exclude: { path: '^\\.next/' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
}
