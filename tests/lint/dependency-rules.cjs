/** What the linter can't see: cycles, re-exports, imports from .vue files. */
const forbid = (name, from, to, more = {}) => ({
  name,
  severity: 'error',
  from: { path: from },
  to: { path: to, ...more },
});

module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    forbid('shared-is-the-floor', '^shared/', '^(server|src|fakes|tests)/'),
    forbid('server-never-meets-client-or-fakes', '^server/', '^(src|fakes|tests)/'),
    forbid('client-never-meets-server', '^src/', '^(server|fakes|tests)/'),
    forbid('nobody-imports-fakes', '^(shared|server|src)/', '^fakes/'),
    forbid(
      'routes-do-not-touch-the-database',
      '^server/routes/(?!health)',
      '^server/db/(schema|client)|node_modules/drizzle-orm',
      {
        dependencyTypesNot: ['type-only'],
      },
    ),
    forbid('services-do-not-know-http', '^server/(services|queries)/', '^server/(http|routes)/|node_modules/express'),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'src/tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'types', 'default'],
      extensions: ['.ts', '.vue', '.js', '.mjs'],
    },
  },
};
