/** @type {import('dependency-cruiser').IConfiguration} */
const config = {
  forbidden: [
    {
      name: 'no-cycles',
      comment: 'Modules that need each other are one module, or hide a third.',
      severity: 'error',
      from: {},
      to: { circular: true },
    },
    {
      name: 'browser-reaches-no-server-code',
      comment:
        'A component ships to the browser; through its own actions.ts it calls the server, and in no other way, however long the chain.',
      severity: 'error',
      from: { path: '^app/.*_components/' },
      to: { path: '^lib/server/', reachable: true },
    },
    {
      name: 'pages-reach-no-models',
      comment: 'Only lib/server/data, seeders and workers know the database.',
      severity: 'error',
      from: { path: '^app/' },
      to: { path: '^db/' },
    },
    {
      name: 'no-orphans',
      comment: 'A module that nobody imports and that imports nothing is left over.',
      severity: 'error',
      from: {
        orphan: true,
        pathNot: ['\\.d\\.ts$', '^app/.*(page|layout|loading|error|not-found|route)\\.tsx?$', '^fixtures/'],
      },
      to: {},
    },
    {
      name: 'everything-resolves',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true },
    },
    {
      name: 'nothing-for-production-from-tests-or-tools',
      comment: 'What runs in production is a dependency, and no part of it lies in tests/.',
      severity: 'error',
      from: { path: '^(app|lib|db|workers)/' },
      to: { path: '^tests/' },
    },
  ],
  options: {
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    // The chain from a component ends at its server actions: those run on the server.
    doNotFollow: { path: ['node_modules', '(^|/)actions\\.ts$'] },
    exclude: { path: ['^\\.next/'] },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};

export default config;
