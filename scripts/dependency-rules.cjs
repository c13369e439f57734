// Who may import whom. Type imports count: they tie folders together just as values do.

const tests = '\\.(spec|testkit)\\.(ts|tsx)$|(^|/)test/';
const geometrySource = '^geometry/(src|dist)/';

/** Frameworks and whatever reaches outside: geometry is plain TypeScript. */
const frameworks =
  'node_modules/(react|react-dom|react-konva|konva|zustand|@nestjs|@radix-ui|@tanstack|express|drizzle-orm|pg|pg-boss|@aws-sdk|nodemailer|stripe)/';
const vendorSdks = 'node_modules/(@aws-sdk/[^/]+|nodemailer|stripe|pg-boss|@types/nodemailer)/';

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    {
      name: 'geometry-stands-alone',
      comment: 'geometry imports neither editor nor api, no framework, and does no I/O.',
      severity: 'error',
      from: { path: '^geometry/src/', pathNot: tests },
      to: { path: ['^(editor|api)/', frameworks] },
    },
    {
      name: 'geometry-does-no-io',
      comment: 'geometry runs in the browser and on the server alike.',
      severity: 'error',
      from: { path: '^geometry/src/', pathNot: tests },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'editor-not-to-api',
      comment: 'The editor knows the server through the client generated from its OpenAPI document.',
      severity: 'error',
      from: { path: '^editor/' },
      to: { path: '^api/' },
    },
    {
      name: 'api-not-to-editor',
      severity: 'error',
      from: { path: '^api/' },
      to: { path: '^editor/' },
    },
    {
      name: 'only-downwards-from-features',
      comment:
        'routes → features → plan-view, components, lib: one way; routes tell features where their links lead.',
      severity: 'error',
      from: { path: '^editor/src/features/' },
      to: { path: '^editor/src/(routes|app)/' },
    },
    {
      name: 'only-downwards-from-shared',
      severity: 'error',
      from: { path: '^editor/src/(components|lib|plan-view|night)/' },
      to: { path: '^editor/src/(routes|features|app)/' },
    },
    {
      name: 'lib-below-components',
      severity: 'error',
      from: { path: '^editor/src/lib/' },
      to: { path: '^editor/src/(components|plan-view|night)/' },
    },
    {
      name: 'features-apart',
      comment: 'No feature imports another.',
      severity: 'error',
      from: { path: '^editor/src/features/([^/]+)/' },
      to: { path: '^editor/src/features/', pathNot: '^editor/src/features/$1/' },
    },
    {
      name: 'tools-and-store-without-view',
      comment: 'Tools and store are tested without a browser: no React, no Konva.',
      severity: 'error',
      from: { path: '^editor/src/features/plan-editor/(tools|store)/', pathNot: tests },
      to: {
        path: [
          'node_modules/(react|react-dom|konva|react-konva|@types/react|@types/react-dom)/',
          '^editor/src/features/plan-editor/(canvas|ledger|profile)/',
          '\\.tsx$',
        ],
      },
    },
    {
      name: 'circuit-plain',
      comment: "The solver is plain functions over geometry's units and estimate.",
      severity: 'error',
      from: { path: '^api/src/circuit/', pathNot: tests },
      to: { pathNot: ['^api/src/circuit/', `${geometrySource}(units|estimate)/`] },
    },
    {
      name: 'drizzle-in-repositories',
      comment: 'Only repositories and database/ import Drizzle.',
      severity: 'error',
      from: { path: '^api/src/', pathNot: ['^api/src/database/', '\\.repository\\.ts$', tests] },
      to: { path: 'node_modules/(drizzle-orm|drizzle-kit)/' },
    },
    {
      name: 'controllers-through-services',
      severity: 'error',
      from: { path: '\\.controller\\.ts$' },
      to: { path: '\\.repository\\.ts$' },
    },
    {
      name: 'vendors-in-ports',
      comment: 'Only ports/ import the SDKs of hosted services.',
      severity: 'error',
      from: { path: '^api/src/', pathNot: ['^api/src/ports/', tests] },
      to: { path: vendorSdks },
    },
    {
      name: 'no-cycles',
      severity: 'error',
      from: {},
      to: { circular: true },
    },
    {
      name: 'src-not-to-tests',
      severity: 'error',
      from: { path: '^(geometry|editor|api)/src/', pathNot: tests },
      to: { path: [tests, '^e2e/'] },
    },
    {
      name: 'resolvable',
      comment: 'What does not resolve could hide from every other rule.',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true },
    },
  ],
  options: {
    doNotFollow: { path: ['node_modules', '/dist/'] },
    exclude: { path: '\\.(css|woff2?)$|\\?(raw|url|worker|inline)$' },
    tsPreCompilationDeps: true,
    combinedDependencies: true,
    tsConfig: { fileName: 'tsconfig.base.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['source', 'types', 'import', 'require', 'node', 'default'],
      mainFields: ['module', 'main', 'types'],
      extensions: ['.ts', '.tsx', '.mts', '.d.ts', '.js', '.mjs', '.cjs', '.json'],
    },
  },
};
