/** The arrows of the architecture: who may import whom. */
module.exports = {
  forbidden: [
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true, dependencyTypesNot: ['type-only'] } },
    {
      name: 'engine-stands-alone',
      comment: 'The engine is pure: it imports only itself and shared.',
      severity: 'error',
      from: { path: '^server/engine/' },
      to: { pathNot: ['^server/engine/', '^shared/'] },
    },
    {
      name: 'shared-stands-alone',
      severity: 'error',
      from: { path: '^shared/' },
      to: { path: ['^server/', '^src/', '^node_modules/(express|typeorm|vue|pinia|quasar)'] },
    },
    {
      name: 'client-knows-only-shared',
      severity: 'error',
      from: { path: '^src/' },
      to: { path: ['^server/', '^tests/'] },
    },
    {
      name: 'nothing-imports-routes',
      severity: 'error',
      from: { pathNot: ['^server/routes/', '^server/app\\.ts$', '^server/openapi', '^tests/'] },
      to: { path: '^server/routes/' },
    },
    {
      name: 'routes-hold-no-sql-and-no-physics',
      severity: 'error',
      from: { path: '^server/routes/' },
      to: { path: ['^server/engine/', '^server/database/', '^node_modules/(typeorm|pg)/'] },
    },
    {
      name: 'services-know-no-http',
      severity: 'error',
      from: { path: '^server/(services|policies|records|workers|database)/' },
      to: {
        path: ['^node_modules/(@types/)?(express|cookie-parser|helmet)', '^server/middleware/', '^server/app\\.ts$'],
      },
    },
    {
      name: 'entities-hold-no-logic',
      severity: 'error',
      from: { path: '^server/database/entities/' },
      to: { path: ['^server/(services|routes|middleware|engine|workers)/'] },
    },
    {
      name: 'nothing-ships-that-is-only-for-development',
      severity: 'error',
      from: { path: '^(server|shared)/', pathNot: '^server/setup/' },
      to: { dependencyTypes: ['npm-dev'], pathNot: '^node_modules/@types/' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { extensions: ['.ts', '.js', '.vue', '.mjs', '.json'] },
  },
};
