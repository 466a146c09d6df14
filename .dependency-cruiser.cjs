/** Imports point one way: app -> components, stores, shared; nothing points back. */
const tops = ['app', 'components', 'stores', 'server', 'shared', 'db', 'tests'];

/** Files under `from` may import, of ours, only what lies under `to` (and non-code files). */
function onlyTo(name, from, to) {
  return {
    name,
    comment: `${from} may import only ${to.join(', ') || 'itself'}`,
    severity: 'error',
    from: { path: `^${from}/` },
    to: { path: `^(${tops.join('|')})/`, pathNot: to.map((folder) => `^${folder}/`) },
  };
}

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    onlyTo('app-direction', 'app', ['app', 'components', 'stores', 'shared']),
    onlyTo('components-direction', 'components', ['components', 'shared']),
    onlyTo('stores-direction', 'stores', ['stores', 'shared', 'db/device']),
    onlyTo('server-direction', 'server', ['server', 'shared', 'db/server']),
    onlyTo('device-database-direction', 'db/device', ['db/device', 'shared']),
    onlyTo('server-database-direction', 'db/server', ['db/server', 'shared']),
    onlyTo('shared-direction', 'shared', ['shared']),
    { name: 'no-circular', severity: 'error', from: {}, to: { circular: true } },
    {
      name: 'shared-stays-pure',
      comment: 'the same code runs on both sides: no Node, no React, no database',
      severity: 'error',
      from: { path: '^shared/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'set-up-runs-before-packages',
      comment: 'server/bin/*.mjs runs before node_modules exists',
      severity: 'error',
      from: { path: '^server/bin/.*\\.mjs$', pathNot: 'serviceWorker\\.mjs$' },
      to: { dependencyTypes: ['npm', 'npm-dev', 'npm-no-pkg', 'npm-unknown'] },
    },
    {
      name: 'no-tests-in-product',
      severity: 'error',
      from: { pathNot: '^tests/' },
      to: { path: '^tests/' },
    },
    { name: 'not-to-unresolvable', severity: 'error', from: {}, to: { couldNotResolve: true } },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^|/)(dist|artifacts|\\.data|\\.expo)/' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
      extensions: ['.web.tsx', '.web.ts', '.tsx', '.ts', '.mjs', '.cjs', '.js', '.json', '.wasm'],
    },
  },
};
