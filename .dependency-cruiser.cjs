/** Where a package lies, whichever file of it an import ends at. */
const packages = (...names) => `(^|/)node_modules/(@types/)?(${names.join('|')})/`;

/**
 * The borders of the product. tests/architecture/boundaries.test.ts breaks each rule once and sees it fire;
 * a rule without such a seed fails there.
 * @type {import('dependency-cruiser').IConfiguration}
 */
module.exports = {
  forbidden: [
    {
      // First, because no other rule can see an import that leads nowhere.
      name: 'no-unresolvable-import',
      comment: 'Every import leads to a file or to an installed package.',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true },
    },
    {
      name: 'no-cycle',
      comment: 'No file imports itself by way of others, not even for a type.',
      severity: 'error',
      from: {},
      to: { circular: true },
    },
    {
      name: 'no-orphan',
      comment: 'A file that imports nothing and that nothing imports is dead, unless it is an entry point.',
      severity: 'error',
      from: { orphan: true, pathNot: ['\\.d\\.m?ts$', '^(server|workers)/index\\.ts$', '^src/main\\.tsx$'] },
      to: {},
    },
    {
      name: 'packages-are-declared',
      comment: 'A package that only another package brought along may be gone after the next install.',
      severity: 'error',
      from: {},
      to: { dependencyTypes: ['npm-no-pkg', 'npm-unknown'] },
    },
    {
      name: 'production-imports-no-test-code',
      comment: 'What runs for patients depends on nothing that is there for tests or for starting.',
      severity: 'error',
      from: { path: '^(src|server|shared|workers)/' },
      to: { path: '^(tests|scripts)/' },
    },
    {
      name: 'production-imports-no-development-package',
      comment: 'What runs for patients runs without the development packages; their types cost nothing.',
      severity: 'error',
      from: { path: '^(src|server|shared|workers)/' },
      to: { dependencyTypes: ['npm-dev'], dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'shared-is-pure',
      comment:
        'Shared code runs on phone and server alike: no input, no output, no clock but the one handed in.',
      severity: 'error',
      from: { path: '^shared/' },
      to: { pathNot: ['^shared/', packages('zod', 'date-fns', '@date-fns/tz')] },
    },
    {
      name: 'client-imports-no-server',
      comment: 'Client and server meet in shared and nowhere else.',
      severity: 'error',
      from: { path: '^src/' },
      to: { path: '^(server|workers)/' },
    },
    {
      name: 'server-imports-no-client',
      comment: 'Client and server meet in shared and nowhere else.',
      severity: 'error',
      from: { path: '^(server|workers)/' },
      to: { path: '^src/' },
    },
    {
      name: 'server-imports-no-worker',
      comment: 'A web runs without a worker; what both do is a service of the server.',
      severity: 'error',
      from: { path: '^server/' },
      to: { path: '^workers/' },
    },
    {
      name: 'features-are-islands',
      comment: 'A feature of the client imports no other; a page or a shell joins them.',
      severity: 'error',
      from: { path: '^src/features/([^/]+)/' },
      to: { path: '^src/features/', pathNot: '^src/features/$1/' },
    },
    {
      name: 'features-know-no-page',
      comment: 'A feature does not know where it is shown.',
      severity: 'error',
      from: { path: '^src/features/' },
      to: { path: '^src/(pages/|app/shells/|router\\.tsx$|main\\.tsx$)' },
    },
    {
      name: 'components-know-no-domain',
      comment: 'The design system knows no domain word, and so no feature, page, session or shared module.',
      severity: 'error',
      from: { path: '^src/components/' },
      to: { path: '^(src/(app|features|lib|pages)|shared)/' },
    },
    {
      name: 'lib-knows-no-screen',
      comment: 'What every screen stands on knows none of them.',
      severity: 'error',
      from: { path: '^src/lib/' },
      to: { path: '^src/(app|components|features|pages)/' },
    },
    {
      name: 'schemas-as-values-in-forms-only',
      comment:
        'A contract as a value brings zod along: only a form, which is a chunk of its own, may load it.',
      severity: 'error',
      from: { path: '^src/', pathNot: ['Form\\.tsx$', '^src/features/triage/CloseFlagDialog\\.tsx$'] },
      to: { path: '^shared/.+/contract\\.ts$', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'http-alone-sees-requests',
      comment:
        'Only server/http, and the two files that put a web together, import Express and what goes with it. ' +
        'The sockets run the session middleware on their handshake, so they may as well.',
      severity: 'error',
      from: {
        path: '^(server|workers)/',
        pathNot: ['^server/http/', '^server/(app|index)\\.ts$', '^server/realtime/sockets\\.ts$'],
      },
      to: {
        path: packages(
          'express',
          'express-session',
          'express-static-gzip',
          'connect-pg-simple',
          'helmet',
          'passport',
          'passport-local',
        ),
      },
    },
    {
      name: 'routes-hold-no-sql',
      comment: 'A route is data and one call; its service and queries speak to the database.',
      severity: 'error',
      from: { path: '(^|/)routes\\.ts$' },
      to: { path: ['^server/db/schema/', packages('drizzle-orm', 'pg')] },
    },
    {
      name: 'workers-reach-use-cases-only',
      comment: 'A task calls a use case of a feature; queries and routes are the feature’s own.',
      severity: 'error',
      from: { path: '^workers/' },
      to: {
        path: '^server/features/',
        pathNot: '^server/features/[^/]+/(service|evaluation|worker-health)\\.ts$',
      },
    },
    {
      name: 'workers-know-no-web',
      comment: 'A worker answers no request and holds no socket.',
      severity: 'error',
      from: { path: '^workers/' },
      to: { path: '^server/(http/|realtime/|demo/|fakes/|(app|index|routes)\\.ts$)' },
    },
  ],
  options: {
    // Type imports count as well: the borders hold for them too, unless a rule says otherwise.
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    doNotFollow: { path: 'node_modules' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'browser', 'default', 'types'],
      extensions: ['.ts', '.tsx', '.mjs', '.js', '.cjs', '.json', '.d.ts', '.d.mts'],
      mainFields: ['module', 'main', 'types'],
    },
  },
};
