/** The coarse layers; test/architecture/layers.test.ts checks the fine ones inside shared-core. */
module.exports = {
  forbidden: [
    {
      name: 'core-stands-alone',
      severity: 'error',
      from: { path: '^shared-core/' },
      to: { path: ['^electron/', '^renderer/', '^test/', '^node_modules/(electron|react)'] },
    },
    {
      name: 'core-has-no-node',
      severity: 'error',
      from: { path: '^shared-core/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'renderer-has-no-host',
      severity: 'error',
      from: { path: '^renderer/', pathNot: 'vite\\.config' },
      to: { path: ['^electron/', '^node_modules/electron'] },
    },
    {
      name: 'services-have-no-electron',
      severity: 'error',
      from: { path: '^electron/(services|loopback|command-line)/' },
      to: { path: ['^node_modules/electron/', '^electron/desktop/'] },
    },
    {
      name: 'nothing-imports-a-door',
      severity: 'error',
      from: { pathNot: '^electron/(desktop|loopback|command-line)/|^test/' },
      to: { path: '^electron/(desktop|loopback|command-line)/' },
    },
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
  ],
  options: {
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.base.json' },
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '(^out/|^release/)' },
  },
};
