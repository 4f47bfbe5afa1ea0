/**
 * The one direction of imports: shared ← calculators ← src, and shared ← calculators ← server.
 * Rules are patterns, not lists of folders, so that the next feature or calculator is covered on its first day.
 * tests/unit/house/dependency-direction.test.ts plants a wrong import of each kind and expects its rule to catch it.
 */
const SHARED_PACKAGES = 'zod|d3-scale|d3-shape|d3-array';
const NUMERIC_PACKAGES = 'zod|fft\\.js|ml-matrix|papaparse|fflate|wavefile|d3-array';
const SERVER_PACKAGES =
  'express|typeorm|pg|multer|jose|helmet|pino|pino-http|nodemailer|smtp-server|mailparser|graphile-worker|prom-client|rate-limiter-flexible|@node-rs/argon2|@aws-sdk/[^/]+|pdfkit|swagger-ui-dist';
const SCREEN_PACKAGES =
  'react|react-dom|react-router-dom|@tanstack/[^/]+|react-hook-form|@hookform/[^/]+|react-aria-components|react-resizable-panels|sonner|lucide-react|@uiw/[^/]+|comlink|idb-keyval';

/** Packages by name, whether found as code or as types. */
const packages = (names) => `(^|/)node_modules/(@types/)?(${names})/`;
const FOUNDATIONS = 'kit|numerics|acoustics|reading';
const CLI = '^calculators/cli(\\.ts$|/)';
const ROUTES = '^server/.*routes\\.ts$';

/** @param {string} name @param {string} comment */
const rule = (name, comment, from, to) => ({ name, comment, severity: 'error', from, to });

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    rule(
      'shared-stands-alone',
      'shared/ is what both sides agree on: it knows neither of them, nor the calculators.',
      { path: '^shared/' },
      { path: '^(calculators|server|src|scripts|public)/' },
    ),
    rule(
      'shared-packages',
      'shared/ runs everywhere: only zod, d3-scale, d3-shape and d3-array.',
      { path: '^shared/' },
      {
        couldNotResolve: false,
        pathNot: ['^(shared|calculators|server|src|scripts|public|tests)/', packages(SHARED_PACKAGES)],
      },
    ),
    rule(
      'calculators-know-no-side',
      'calculators/ is science: it knows neither the server nor the screens.',
      { path: '^calculators/' },
      { path: '^(server|src|scripts|public)/' },
    ),
    rule(
      'calculators-stay-pure',
      'calculators/ runs in browsers, threads and scripts alike: numeric packages only, no React, no Node (the command line apart).',
      { path: '^calculators/', pathNot: CLI },
      {
        couldNotResolve: false,
        pathNot: ['^(shared|calculators|server|src|scripts|public|tests)/', packages(NUMERIC_PACKAGES)],
      },
    ),
    rule(
      'command-line-without-screens',
      'The command line may use Node, but neither screens nor the server.',
      { path: CLI },
      { path: packages(`${SCREEN_PACKAGES}|${SERVER_PACKAGES}`) },
    ),
    rule(
      'calculator-imports-calculator',
      'A calculator uses the kit, numerics, acoustics and reading, never another calculator or the registry.',
      { path: `^calculators/(?!(?:${FOUNDATIONS}|cli)/)([^/]+)/` },
      { path: '^calculators/', pathNot: `^calculators/($1|${FOUNDATIONS})/` },
    ),
    rule(
      'foundations-below-calculators',
      'kit, numerics, acoustics and reading carry the calculators and know none of them.',
      { path: `^calculators/(${FOUNDATIONS})/` },
      { path: '^calculators/', pathNot: `^calculators/(${FOUNDATIONS})/` },
    ),
    rule('server-imports-src', 'The server never imports the screens.', { path: '^server/' }, { path: '^src/' }),
    rule('src-imports-server', 'The screens never import the server.', { path: '^src/' }, { path: '^server/' }),
    rule(
      'server-without-screens',
      'The server has no use for packages of the screens.',
      { path: '^server/' },
      { path: packages(SCREEN_PACKAGES) },
    ),
    rule(
      'src-without-node',
      'The screens run in a browser: no Node module.',
      { path: '^src/' },
      { dependencyTypes: ['core'] },
    ),
    rule(
      'src-without-server-packages',
      'The screens run in a browser: no package of the server.',
      { path: '^src/' },
      { path: packages(SERVER_PACKAGES) },
    ),
    rule(
      'feature-imports-feature',
      'A feature never imports another feature; a page composes them.',
      { path: '^src/features/([^/]+)/' },
      { path: '^src/features/', pathNot: '^src/features/$1/' },
    ),
    rule(
      'feature-imports-page',
      'Pages and the router compose features, not the other way round.',
      { path: '^src/features/' },
      { path: '^src/(pages/|router|main)' },
    ),
    rule(
      'component-imports-upwards',
      'Components, workers, the sandbox and lib have no feature in them.',
      { path: '^src/(components|workers|sandbox|lib)/' },
      { path: '^src/(features/|pages/|router|main)' },
    ),
    rule(
      'router-sees-database',
      'A router parses, calls a service and answers: it never sees a repository or an entity.',
      { path: ROUTES },
      { path: ['^server/database/', packages('typeorm|pg')] },
    ),
    rule(
      'service-sees-express',
      'A service never sees a request.',
      { path: '^server/.*service\\.ts$' },
      { path: [packages('express|express-serve-static-core'), ROUTES] },
    ),
    rule('product-imports-tests', 'Nothing imports tests/.', { pathNot: '^tests/' }, { path: '^tests/' }),
    rule(
      'product-imports-scripts',
      'scripts/ sets the project up; the product runs without it.',
      { path: '^(shared|calculators|server|src)/' },
      { path: '^scripts/' },
    ),
    rule(
      'scripts-on-plain-node',
      'scripts/ runs before anything is installed: Node itself and its own files only.',
      { path: '^scripts/' },
      { pathNot: '^scripts/', dependencyTypesNot: ['core'] },
    ),
    rule(
      'product-imports-dev-package',
      'What the product imports belongs in "dependencies" (types, and the bundler in development, apart).',
      { path: '^(shared|calculators|server|src)/' },
      {
        dependencyTypes: ['npm-dev'],
        dependencyTypesNot: ['type-only'],
        pathNot: ['node_modules/@types/', packages('esbuild')],
      },
    ),
    rule(
      'no-circle',
      'Two files that need each other are one file, or three.',
      {},
      {
        circular: true,
        viaOnly: { dependencyTypesNot: ['type-only'] },
      },
    ),
    rule('no-unresolved', 'An import that leads nowhere.', {}, { couldNotResolve: true, pathNot: '^virtual:' }),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    exclude: { path: '^tests/fixtures/' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    detectProcessBuiltinModuleCalls: true,
    skipAnalysisNotInRules: false,
    enhancedResolveOptions: { conditionNames: ['import', 'node', 'default', 'types'], exportsFields: ['exports'] },
  },
};
