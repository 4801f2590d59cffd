/** The layer rule: `shared/` imports neither side; `src/` and `server/` meet only through `shared/`. */
module.exports = {
  forbidden: [
    {
      name: 'shared-imports-no-side',
      severity: 'error',
      from: { path: '^shared/' },
      to: { path: '^(src|server|test)/' },
    },
    {
      name: 'src-never-imports-server',
      severity: 'error',
      from: { path: '^src/' },
      to: { path: '^(server|test)/' },
    },
    {
      name: 'server-never-imports-src',
      severity: 'error',
      from: { path: '^server/' },
      to: { path: '^(src|test)/' },
    },
    {
      name: 'shared-is-pure',
      severity: 'error',
      from: { path: '^shared/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'no-circular',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { extensions: ['.ts', '.mjs', '.js', '.json'] },
  },
};
