/** Who may import whom. Each rule says what would break if it were not kept. */
const never = (name, comment, from, to) => ({ name, comment, severity: 'error', from, to });

/** @type {import('dependency-cruiser').IConfiguration} */
export default {
  forbidden: [
    never(
      'numerics-pure',
      'The numerical core knows typed arrays and ml-matrix, nothing else; its second thread is one of Node.js.',
      { path: '^src/numerics', pathNot: '^src/numerics/kernels/second-thread' },
      { pathNot: '^src/numerics|^node_modules/ml-matrix' },
    ),
    never(
      'server-below-features',
      'src/server serves features and knows none.',
      { path: '^src/server' },
      { path: '^src/(features|pages|layouts|components|actions|middleware)' },
    ),
    never('lib-below-all', 'src/lib runs anywhere.', { path: '^src/lib' }, { path: '^src/(?!lib)' }),
    never(
      'components-know-no-domain',
      'Controls and charts have no domain knowledge.',
      { path: '^src/components', pathNot: '^src/components/gallery' },
      { path: '^src/(features|server|pages|layouts|numerics)' },
    ),
    never(
      'layouts-only-draw',
      'Shells draw what they are given.',
      { path: '^src/layouts' },
      { path: '^src/(features|server|pages|numerics)' },
    ),
    never(
      'browser-safe-files',
      'What the browser loads never reaches the server.',
      { path: '^src/features/', pathNot: '\\.server\\.ts$|/emails/' },
      { path: '^src/server/|\\.server\\.ts$' },
    ),
    never(
      'sequelize-on-the-server',
      'Rows are for the server.',
      { path: '^src', pathNot: '^src/server/|\\.server\\.ts$' },
      { path: '^node_modules/sequelize' },
    ),
    never(
      'features-through-doors',
      'Another feature is entered by its doors: index.ts, index.server.ts, ui/index.ts.',
      { path: '^src/features/([^/]+)/' },
      {
        path: '^src/features/([^/]+)/',
        pathNot: '^src/features/$1/|^src/features/[^/]+/(index|index\\.server|ui/index)\\.tsx?$',
      },
    ),
    never(
      'no-astro-in-the-worker',
      'The job process starts without Astro.',
      { path: '^src/(worker|thread)\\.ts$' },
      { path: '^node_modules/astro|^astro:', reachable: true },
    ),
    never(
      'migrations-stand-alone',
      'A landed migration never changes with the code.',
      { path: '^db/migrations' },
      { path: '^src' },
    ),
    never('src-without-tests', 'The product does not need its tests.', { path: '^src' }, { path: '^tests' }),
    never(
      'no-cycles',
      'A cycle has no first file to read.',
      {},
      { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    ),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    exclude: { path: '^(dist|\\.astro)' },
    enhancedResolveOptions: { extensions: ['.ts', '.tsx', '.mjs', '.js', '.astro', '.json'] },
  },
};
