/**
 * Which way imports run. What a folder of lib may import from the project stands in one table; a folder that is not in
 * it may import nothing, so a new one has to be placed first. There is no list of exceptions.
 */
const SIM = ['units', 'control', 'sim'];
const RING = [...SIM, 'identify', 'requirement', 'change'];
const EDGES = ['schemas', 'env', 'errors', 'ids', 'log'];
const SERVICE = [...RING, ...EDGES, 'auth', 'audit', 'mail', 'sheets', 'jobs', 'services', 'db'];

const MAY_IMPORT = {
  units: ['units'],
  control: ['units', 'control'],
  sim: SIM,
  identify: [...SIM, 'identify'],
  requirement: [...SIM, 'requirement'],
  change: ['units', 'change'],
  schemas: [...RING, 'errors', 'schemas'],
  auth: [...EDGES, 'change', 'auth', 'audit', 'db'],
  audit: [...EDGES, 'auth', 'audit', 'change', 'db'],
  mail: [...EDGES, 'change', 'auth', 'audit', 'mail', 'db'],
  sheets: [...RING, ...EDGES, 'sheets'],
  jobs: SERVICE,
  services: SERVICE,
  http: [...SERVICE, 'http'],
};

const MODULE = (name) => (name === 'db' ? '^db/' : `^lib/${name}(/|\\.ts$)`);
const PROJECT = '^(app|components|db|lib|worker|scripts|tests)/';
const PURE = `^lib/(${RING.join('|')})/|^lib/result\\.ts$`;
const PACKAGE = (...names) => `node_modules/(${names.join('|')})/`;

const layers = Object.entries(MAY_IMPORT).map(([folder, allowed]) => ({
  name: `lib-${folder}`,
  comment: `lib/${folder} imports nothing of the project but ${allowed.join(', ')}.`,
  severity: 'error',
  from: { path: `^lib/${folder}/` },
  to: { path: PROJECT, pathNot: ['^lib/result\\.ts$', ...allowed.map(MODULE)] },
}));

const rule = (name, comment, from, to) => ({ name, comment, severity: 'error', from, to });

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    ...layers,
    rule(
      'lib-folder-without-a-place',
      'A new folder of lib gets its line in MAY_IMPORT first.',
      { path: '^lib/[^/]+/', pathNot: `^lib/(${Object.keys(MAY_IMPORT).join('|')})/` },
      { path: PROJECT },
    ),
    rule(
      'lib-single-files',
      'The single files of lib stand below everything.',
      { path: '^lib/[^/]+\\.ts$' },
      { path: PROJECT, pathNot: '^lib/[^/]+\\.ts$' },
    ),
    rule('no-cycles', 'No module imports itself by a detour.', {}, { circular: true }),
    rule('nothing-imports-app', 'Routes are the top.', { pathNot: '^app/' }, { path: '^app/' }),
    rule(
      'pure-ring-without-node',
      'The pure ring runs in the browser too.',
      { path: PURE },
      { dependencyTypes: ['core'] },
    ),
    rule(
      'pure-ring-without-frameworks',
      'The pure ring knows neither pages nor a database.',
      { path: PURE },
      { path: PACKAGE('react', 'react-dom', 'next', 'drizzle-orm', 'pg', 'iron-session', 'zod') },
    ),
    rule(
      'mathjs-in-the-parser-only',
      'mathjs reads plant text and nothing else.',
      { pathNot: '^lib/control/plant-text/' },
      { path: PACKAGE('mathjs') },
    ),
    rule(
      'odex-in-its-engine-only',
      'odex is the second engine and nothing else.',
      { pathNot: '^lib/sim/ode/' },
      { path: PACKAGE('odex') },
    ),
    rule(
      'services-without-next-and-react',
      'What writes knows nothing of pages and requests, not even by a detour.',
      { path: '^(lib/(services|audit|mail|sheets|jobs|schemas)|db|worker)/' },
      { path: PACKAGE('next', 'react', 'react-dom'), reachable: true },
    ),
    rule(
      'db-below-services',
      'Tables and queries know types of the ring, the scope and the environment; only seeds call services.',
      { path: '^db/', pathNot: '^db/seed/' },
      { path: '^(lib/(services|http|mail|audit|jobs)|worker|scripts)/' },
    ),
    rule(
      'components-show',
      'Components get what they show; they fetch nothing on the server.',
      { path: '^components/' },
      { path: '^(db|lib|worker|scripts)/', pathNot: `${PURE}|^lib/schemas/` },
    ),
    rule(
      'pages-read-through-queries',
      'Pages and routes read through db/queries and write through services.',
      { path: '^app/' },
      { path: '^(db/(client|migrate|seed|schema)|worker|scripts)' },
    ),
    rule(
      'only-db-and-services-speak-sql',
      'Elsewhere the query builder is not to be seen.',
      { path: '^(app|components|lib|worker)/', pathNot: '^lib/(services|auth|audit|mail|jobs|http)/' },
      { path: PACKAGE('drizzle-orm', 'pg') },
    ),
    rule(
      'tests-and-scripts-stay-out',
      'The product does not lean on its tests or its scripts.',
      { path: '^(app|components|db|lib|worker)/' },
      { path: '^(tests|scripts)/' },
    ),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      exportsFields: ['exports'],
      conditionNames: ['import', 'require', 'node', 'default', 'types'],
    },
  },
};
