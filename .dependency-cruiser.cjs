/**
 * The import rule of the house. Inside analysis a folder may use only what stands above it in
 * `layers`; `distributions` and `refusal.ts` are leaves that all may use and that use nothing.
 */
const layers = [
  'sheet',
  'spectrum',
  'reading',
  'standards',
  'unmixing',
  'doubts',
  'split',
  'addition',
  'report',
];

const downwards = layers.map((layer, index) => ({
  name: `analysis-${layer}-looks-down-only`,
  comment: `analysis/${layer} may use only the folders before it in the list of DEVELOPERS.md`,
  severity: 'error',
  from: { path: `^analysis/${layer}/` },
  to: {
    path: '^analysis/',
    pathNot: [
      ...layers
        .slice(layer === 'spectrum' ? index : 0, index + 1)
        .map((allowed) => `^analysis/${allowed}/`),
      '^analysis/distributions/',
      '^analysis/(refusal|program)[.]ts$',
    ],
  },
}));

module.exports = {
  forbidden: [
    ...downwards,
    {
      name: 'leaves-use-nothing',
      severity: 'error',
      from: { path: '^analysis/(distributions/|refusal[.]ts$)' },
      to: { path: '^analysis/', pathNot: '^analysis/distributions/' },
    },
    {
      name: 'only-one-door-to-analysis',
      severity: 'error',
      from: { path: '^(main|renderer)/' },
      to: { path: '^analysis/', pathNot: '^analysis/index[.]ts$' },
    },
    {
      name: 'analysis-knows-no-outside',
      comment: 'no screen, no file system, no Electron',
      severity: 'error',
      from: { path: '^analysis/' },
      to: {
        path: '^(main|renderer|tests|sample-data)/|node_modules/(electron|preact|plotly|comlink|playwright)',
      },
    },
    {
      name: 'analysis-uses-no-node',
      severity: 'error',
      from: { path: '^analysis/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'main-and-renderer-share-only-channel-types',
      severity: 'error',
      from: { path: '^renderer/' },
      to: { path: '^main/', pathNot: '^main/desktop/channels[.]ts$' },
    },
    {
      name: 'main-does-not-reach-into-the-screen',
      severity: 'error',
      from: { path: '^main/' },
      to: { path: '^renderer/' },
    },
    {
      name: 'no-tests-in-the-product',
      severity: 'error',
      from: { path: '^(main|renderer)/' },
      to: { path: '^tests/' },
    },
    { name: 'no-circles', severity: 'error', from: {}, to: { circular: true } },
    {
      name: 'no-unresolvable',
      severity: 'error',
      from: { pathNot: '^renderer/' },
      to: { couldNotResolve: true },
    },
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'main/tsconfig.json' },
    enhancedResolveOptions: {
      extensions: ['.ts', '.tsx', '.mjs', '.js'],
      exportsFields: ['exports'],
      conditionNames: ['import', 'node', 'default', 'types'],
    },
  },
};
