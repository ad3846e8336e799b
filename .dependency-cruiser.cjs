/** Direction of imports; the same table stands in DEVELOPERS.md. */
const only = (name, from, allowed) => ({
  name,
  severity: 'error',
  from: { path: from },
  to: { path: '^(src|server|tests)/', pathNot: [from, ...allowed] },
});
const npm = (name, from, pathNot) => ({
  name,
  severity: 'error',
  from: { path: from },
  to: { path: 'node_modules', pathNot },
});

module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    only('engine-alone', '^src/engine/', []),
    npm('engine-packages', '^src/engine/(?!expression|integrators|schema|linalg|core/[a-z-]+\\.mjs)', ['^$']),
    npm('engine-expression-packages', '^src/engine/expression/', ['node_modules/mathjs']),
    npm('engine-schema-packages', '^src/engine/schema/', ['node_modules/zod']),
    npm('engine-integrators-packages', '^src/engine/integrators/', ['node_modules/odex']),
    npm('engine-linalg-packages', '^src/engine/linalg/', ['node_modules/ml-matrix']),
    only('core-first', '^src/engine/core/', ['^src/engine/expression/']),
    only('expression-and-linalg-first', '^src/engine/(expression|linalg)/', [
      '^src/engine/core/',
      '^src/engine/schema/(limits|symbols)\\.ts$',
    ]),
    only('schema-low', '^src/engine/schema/', ['^src/engine/expression/']),
    only('workers', '^src/workers/', ['^src/engine/', '^src/contract/']),
    only('batch', '^src/batch/', ['^src/engine/', '^src/contract/']),
    only('contract', '^src/contract/', ['^src/engine/schema/']),
    only('presets', '^src/presets/', ['^src/engine/schema/']),
    only('components-lib', '^src/(components|lib)/', [
      '^src/(components|lib|contract)/',
      '^src/engine/schema/(preset|limits|symbols)\\.ts$',
    ]),
    only('workbench', '^src/features/workbench/', [
      '^src/(components|lib|graphics|presets|contract|workers)/',
      '^src/engine/(schema|expression)/',
      '^src/engine/[a-z-]+/contract\\.ts$',
    ]),
    only('library', '^src/features/library/', [
      '^src/(components|lib|graphics|presets|contract)/',
      '^src/engine/(schema|expression)/',
    ]),
    only('account', '^src/features/account/', [
      '^src/(components|lib|contract)/',
      '^src/engine/schema/zod\\.ts$',
    ]),
    only('assigned', '^src/features/assigned/', [
      '^src/(components|lib|graphics|contract|workers)/',
      '^src/engine/schema/',
      '^src/engine/[a-z-]+/contract\\.ts$',
    ]),
    only('lab', '^src/features/lab/', ['^src/(components|lib|contract)/']),
    only('graphics', '^src/graphics/', [
      '^src/lib/',
      '^src/engine/[a-z-]+/contract\\.ts$',
      '^src/engine/schema/',
    ]),
    only('server', '^server/', ['^src/(contract|presets)/', '^src/engine/(schema|expression)/']),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: 'specify',
    tsConfig: { fileName: 'tsconfig.json' },
    exclude: { path: '\\.d\\.ts$' },
    enhancedResolveOptions: { extensions: ['.ts', '.tsx', '.js', '.css'] },
  },
};
