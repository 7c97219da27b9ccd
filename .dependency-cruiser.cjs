/** One direction of imports: app -> lib -> db; the engine stands alone. */
module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    {
      name: 'app-never-imports-db',
      comment: 'Pages and routes reach data through the verbs of lib.',
      severity: 'error',
      from: { path: '^app/' },
      to: { path: '^(db|drizzle)/' },
    },
    {
      name: 'lib-never-imports-app',
      severity: 'error',
      from: { path: '^(lib|db|realtime)/' },
      to: { path: '^app/' },
    },
    {
      name: 'db-imports-nothing-of-lib-but-env',
      severity: 'error',
      from: { path: '^db/', pathNot: '^db/(seed/|migrate\\.ts)' },
      to: { path: '^lib/', pathNot: '^lib/(env|errors|log)/' },
    },
    {
      name: 'engine-stands-alone',
      severity: 'error',
      from: { path: '^lib/formability/' },
      to: { path: '^(app|db|lib|realtime|tests)/', pathNot: '^lib/formability/' },
    },
    {
      name: 'engine-starts-processes-in-one-place',
      comment:
        'A STEP file is converted in a process of its own; nothing else of the engine starts one or opens sockets.',
      severity: 'error',
      from: {
        path: '^lib/formability/',
        pathNot: '^lib/formability/parse/step/(run-converter\\.ts|step-process\\.mjs)$',
      },
      to: { path: '^(node:)?(child_process|net|http|https|dgram|tls)$' },
    },
    {
      name: 'raw-client-stays-home',
      comment:
        'The untenanted client may be imported by db, lib/auth, lib/jobs, the health probe and commands (which close it) only.',
      severity: 'error',
      from: { path: '^(app|lib|realtime)/', pathNot: '^lib/(auth|jobs|health)/|-command\\.ts$' },
      to: { path: '^db/client\\.ts$' },
    },
    {
      name: 'only-data-files-query',
      comment: 'A feature queries its tables in its own data files; everything else calls them.',
      severity: 'error',
      from: { path: '^lib/(review|production|workspaces|studio)/', pathNot: 'data\\.ts$' },
      to: { path: '^db/schema/', dependencyTypesNot: ['type-only'] },
    },
    {
      name: 'tests-are-not-product',
      severity: 'error',
      from: { path: '^(app|lib|db|realtime)/' },
      to: { path: '^tests/' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    exclude: { path: '(^|/)(node_modules|\\.next[^/]*|\\.data[^/]*)/' },
  },
};
