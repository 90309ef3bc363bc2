/** The arrows of DEVELOPERS.md: what may import what. Types count too. */
const up = (name, from, to) => ({ name, severity: 'error', from: { path: from }, to: { path: to } });

module.exports = {
  forbidden: [
    up(
      'lib-knows-no-framework',
      '^lib/',
      '(^|/)node_modules/(react|react-dom|next|drizzle-orm|postgres|zustand|swr)/|^(app|components|db|scripts)/',
    ),
    {
      name: 'lib-is-pure',
      comment: 'Node built-ins only in the solver thread and its client',
      severity: 'error',
      from: { path: '^lib/', pathNot: '^lib/solver/worker/' },
      to: { dependencyTypes: ['core'] },
    },
    up('graph-is-lowest', '^lib/graph/', '^lib/(fabric|mapping|solver|formats)/'),
    up('fabric-knows-graph-only', '^lib/fabric/', '^lib/(mapping|solver|formats)/'),
    up('mapping-knows-no-solver', '^lib/mapping/', '^lib/(solver|formats)/'),
    up('formats-know-no-solver', '^lib/formats/', '^lib/solver/'),
    up('solver-knows-no-formats', '^lib/solver/', '^lib/formats/'),
    {
      name: 'verifier-shares-no-solver-code',
      severity: 'error',
      from: { path: '^lib/mapping/verify' },
      to: { path: '^lib/solver/' },
    },
    up('components-know-lib-only', '^components/', '^(app|db|scripts)/'),
    up('db-knows-lib-only', '^db/', '^(app|components|scripts)/'),
    { name: 'no-circular', severity: 'error', from: {}, to: { circular: true } },
    { name: 'no-orphan-types', severity: 'ignore', from: {}, to: {} },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
