/** The architecture, as rules: a comment says why, `npm run check` says where. */
module.exports = {
  forbidden: [
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
    {
      name: 'packages-know-no-app',
      severity: 'error',
      comment: 'Packages are shared; an app is a leaf.',
      from: { path: '^packages/' },
      to: { path: '^apps/' },
    },
    {
      name: 'apps-do-not-meet',
      severity: 'error',
      comment: 'web and api share only contracts and quantities.',
      from: { path: '^apps/([^/]+)/' },
      to: { path: '^apps/', pathNot: '^apps/$1/' },
    },
    {
      name: 'core-is-pure',
      severity: 'error',
      comment: 'quantities and ledger run without a database, a server or a clock.',
      from: { path: '^packages/(quantities|ledger)/src', pathNot: '[.]test[.]ts$' },
      to: { pathNot: '^packages/(quantities|ledger)/src' },
    },
    {
      name: 'quantities-stand-alone',
      severity: 'error',
      comment: 'The ledger counts in quantities, never the other way round.',
      from: { path: '^packages/quantities/' },
      to: { path: '^packages/(?!quantities/)' },
    },
    { name: 'imports-resolve', severity: 'error', from: {}, to: { couldNotResolve: true } },
    {
      name: 'imports-are-declared',
      severity: 'error',
      comment: 'Hoisting must not hide a missing dependency.',
      from: {},
      to: { dependencyTypes: ['npm-no-pkg', 'npm-unknown'] },
    },
    {
      name: 'web-sees-no-ledger',
      severity: 'error',
      comment: 'The browser asks; only the API posts.',
      from: { path: '^apps/web/' },
      to: { path: '^packages/ledger/' },
    },
    {
      name: 'frame-knows-no-feature',
      severity: 'error',
      comment:
        'http, database and adapters carry every feature; only the entities are listed for the database.',
      from: { path: '^apps/api/src/(http|database|adapters|config)/', pathNot: '[.]test[.]ts$' },
      to: { path: '^apps/api/src/features/', pathNot: '[.]entity[.]ts$' },
    },
    {
      name: 'features-do-not-reach-inside',
      severity: 'error',
      comment:
        "A feature may call another feature's functions, never its entities, routes or presenters.",
      from: { path: '^apps/api/src/features/([^/]+)/' },
      to: {
        path: '^apps/api/src/features/[^/]+/.+[.](entity|routes|presenter)[.]ts$',
        pathNot: '^apps/api/src/features/$1/',
      },
    },
    {
      name: 'web-features-do-not-meet',
      severity: 'error',
      comment: 'A screen composes features; a feature knows no other.',
      from: { path: '^apps/web/src/features/([^/]+)/' },
      to: { path: '^apps/web/src/features/', pathNot: '^apps/web/src/features/$1/' },
    },
    {
      name: 'web-parts-know-no-feature',
      severity: 'error',
      comment: 'components and lib are used by every feature.',
      from: { path: '^apps/web/src/(components|lib)/' },
      to: { path: '^apps/web/src/(features|app)/' },
    },
    {
      name: 'shipped-code-needs-no-test-code',
      severity: 'error',
      comment: 'Tests, tools and the local stack are not shipped.',
      from: { path: '^(apps|packages/(quantities|ledger|contracts))/', pathNot: '[.]test[.]tsx?$' },
      to: { path: '^(packages/(local-stack|tooling)|tests)/' },
    },
    {
      name: 'start-needs-no-package',
      severity: 'error',
      comment: 'npm start runs before anything is installed: Node built-ins only.',
      from: { path: '^packages/local-stack/src/' },
      to: { pathNot: '^packages/local-stack/src/', dependencyTypesNot: ['core'] },
    },
    {
      name: 'model-is-independent',
      severity: 'error',
      comment: 'The model that proves the ledger is written from the rules, not from the ledger.',
      from: { path: '^tests/properties/' },
      to: { path: '^packages/ledger/' },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^|/)(dist|[.]tsbuild|[.]foldwell)/' },
    tsConfig: { fileName: 'tsconfig.base.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'types', 'default'],
    },
  },
};
