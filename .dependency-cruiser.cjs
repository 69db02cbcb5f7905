/** Which way imports run. The pure ring knows nothing of the web, the database or the machine it runs on. */
const PURE = '^lib/(units|control|sim|identify|requirement|change)/|^lib/result\\.ts$';

/** @type {import('dependency-cruiser').IConfiguration} */
module.exports = {
  forbidden: [
    { name: 'no-cycles', severity: 'error', from: {}, to: { circular: true } },
    { name: 'nothing-imports-app', severity: 'error', from: { pathNot: '^app/' }, to: { path: '^app/' } },
    {
      name: 'units-at-the-bottom',
      severity: 'error',
      from: { path: '^lib/units/' },
      to: { path: '^(lib|db|components|worker)/', pathNot: '^lib/(units/|result\\.ts)' },
    },
    {
      name: 'control-over-units',
      severity: 'error',
      from: { path: '^lib/control/' },
      to: { path: '^(lib|db|components|worker)/', pathNot: '^lib/(units/|control/|result\\.ts)' },
    },
    {
      name: 'sim-over-control',
      severity: 'error',
      from: { path: '^lib/sim/' },
      to: { path: '^(lib|db|components|worker)/', pathNot: '^lib/(units/|control/|sim/|result\\.ts)' },
    },
    {
      name: 'requirement-over-sim',
      severity: 'error',
      from: { path: '^lib/(requirement|identify)/' },
      to: {
        path: '^(lib|db|components|worker)/',
        pathNot: '^lib/(units/|control/|sim/|requirement/|identify/|result\\.ts)',
      },
    },
    {
      name: 'change-knows-units-only',
      severity: 'error',
      from: { path: '^lib/change/' },
      to: { path: '^(lib|db|components|worker)/', pathNot: '^lib/(units/|change/|result\\.ts)' },
    },
    { name: 'pure-ring-is-pure', severity: 'error', from: { path: PURE }, to: { dependencyTypes: ['core'] } },
    {
      name: 'pure-ring-without-frameworks',
      severity: 'error',
      from: { path: PURE },
      to: { path: 'node_modules/(react|next|drizzle-orm|pg|iron-session|zod)/' },
    },
    {
      name: 'mathjs-in-the-parser-only',
      severity: 'error',
      from: { pathNot: '^lib/control/plant-text/|^tests/' },
      to: { path: 'node_modules/mathjs/' },
    },
    {
      name: 'odex-in-its-engine-only',
      severity: 'error',
      from: { pathNot: '^lib/sim/ode/' },
      to: { path: 'node_modules/odex/' },
    },
    {
      name: 'services-without-next-and-react',
      severity: 'error',
      from: { path: '^lib/(services|audit|mail|schemas)/' },
      to: { path: 'node_modules/(next|react)/' },
    },
    {
      name: 'services-below-pages',
      severity: 'error',
      from: { path: '^lib/' },
      to: { path: '^components/' },
    },
    {
      name: 'db-knows-types-of-the-ring',
      severity: 'error',
      from: { path: '^db/(schema|queries|client|tx|migrate)' },
      to: { path: '^lib/(services|http|mail)/' },
    },
    {
      name: 'components-show',
      severity: 'error',
      from: { path: '^components/' },
      to: {
        path: '^(db|lib)/',
        pathNot: '^lib/(units|control|sim|identify|requirement|change|schemas)/|^lib/result\\.ts',
      },
    },
    {
      name: 'only-services-write',
      severity: 'error',
      from: { path: '^(app|components)/' },
      to: { path: '^db/(client|seed|schema)' },
    },
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
