/** Import directions. Each rule is one sentence of DEVELOPERS.md. */
const packages = [
  'npm',
  'npm-dev',
  'npm-optional',
  'npm-peer',
  'core',
  'npm-no-pkg',
  'npm-unknown',
];
const only = (name, from, to, comment) => ({
  name,
  severity: 'error',
  comment,
  from: { path: from },
  to: { pathNot: to, dependencyTypesNot: packages },
});
const never = (name, from, to, comment) => ({ name, severity: 'error', comment, from, to });

module.exports = {
  forbidden: [
    never('no-cycles', {}, { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } }),
    only(
      'domain-imports-only-domain',
      '^shared/domain/',
      '^shared/domain/',
      'The core knows nothing of transport, storage or screens.',
    ),
    never(
      'domain-uses-stdlib-and-luxon-only',
      { path: '^shared/domain/' },
      {
        dependencyTypes: ['npm', 'npm-dev', 'core', 'npm-no-pkg', 'npm-unknown'],
        pathNot: 'node_modules/(@stdlib|@types/luxon|luxon)/',
      },
    ),
    only(
      'contracts-import-domain-and-contracts',
      '^shared/contracts/',
      '^shared/(contracts|domain)/',
    ),
    never(
      'contracts-use-zod-only',
      { path: '^shared/contracts/' },
      { dependencyTypes: ['npm', 'npm-dev', 'core'], pathNot: 'node_modules/zod/' },
    ),
    only('client-imports-client-and-shared', '^src/', '^(src|shared)/'),
    never(
      'client-shared-parts-do-not-import-features',
      { path: '^src/(components|hooks|lib)/' },
      { path: '^src/(features|app)/' },
    ),
    never(
      'client-features-do-not-import-app',
      { path: '^src/features/' },
      { path: '^src/app/(?!paths)' },
    ),
    never(
      'client-features-are-islands',
      { path: '^src/features/([^/]+)/' },
      { path: '^src/features/', pathNot: '^src/features/$1/' },
    ),
    only('server-imports-server-and-shared', '^server/', '^(server|shared)/'),
    never(
      'only-repositories-touch-the-database',
      { path: '^server/features/', pathNot: '\\.repository\\.ts$' },
      { path: ['^server/db/tables/', 'node_modules/(drizzle-orm|pg)/'] },
    ),
    never(
      'services-know-no-http',
      { path: '\\.(service|repository)\\.ts$' },
      { path: ['^server/http/', 'node_modules/express/', '\\.routes\\.ts$'] },
    ),
    never(
      'repositories-are-private-to-their-feature',
      { path: '^server/features/([^/]+)/' },
      {
        path: '^server/features/[^/]+/.*\\.(repository|routes)\\.ts$',
        pathNot: '^server/features/$1/',
      },
    ),
    only('worker-imports-server-and-shared', '^worker/', '^(worker|server|shared)/'),
    never(
      'worker-never-imports-http',
      { path: '^worker/' },
      { path: ['^server/http/', '\\.(routes|repository)\\.ts$'] },
    ),
    only('fakes-stand-alone', '^fakes/', '^fakes/'),
    never(
      'nothing-shipped-imports-tests-or-fakes',
      { path: '^(src|server|worker|shared)/' },
      { path: '^(tests|fakes)/' },
    ),
    never('not-to-unresolvable', {}, { couldNotResolve: true }),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: 'specify',
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'node', 'default', 'types'],
      extensions: ['.ts', '.tsx', '.js'],
    },
  },
};
