/** The arrows between the rooms, one rule an arrow. Run through `npm run arrows`, which also fails on 0 modules. */
const CORE_FLOORS = [
  'errors',
  'random',
  'distributions',
  'table',
  'linear',
  'cluster',
  'mixed',
  'gee',
  'lines',
  'independence',
  'assumptions',
  'monitoring',
  'analysis',
];

const coreFloorRules = CORE_FLOORS.map((floor, index) => ({
  name: `core-${floor}-imports-only-lower-floors`,
  severity: 'error',
  from: { path: `^core/${floor}/` },
  to: {
    path: CORE_FLOORS.slice(index + 1)
      .map((above) => `^core/${above}/`)
      .concat(['^core/index', '^core/light']),
  },
}));

module.exports = {
  forbidden: [
    {
      name: 'no-cycles',
      severity: 'error',
      from: { pathNot: '^database/entities/' },
      to: { circular: true },
    },
    {
      name: 'core-imports-nothing-of-ours',
      severity: 'error',
      from: { path: '^core/' },
      to: { path: '^(api|web|database|seeds-demo|tests)/' },
    },
    {
      name: 'core-packages',
      severity: 'error',
      from: { path: '^core/' },
      to: { path: '^node_modules/', pathNot: '^node_modules/(ml-matrix|jstat|@types)/' },
    },
    {
      name: 'core-no-node',
      severity: 'error',
      from: { path: '^core/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'contracts-are-a-leaf',
      severity: 'error',
      from: { path: '^api/contracts/' },
      to: { pathNot: '^(api/contracts/|node_modules/zod/)' },
    },
    {
      name: 'database-below-api',
      severity: 'error',
      from: { path: '^database/' },
      to: { path: '^(api|web|seeds-demo|tests)/' },
    },
    {
      name: 'api-below-web',
      severity: 'error',
      from: { path: '^api/' },
      to: { path: '^(web|tests)/' },
    },
    {
      name: 'only-the-cli-loads-the-demo',
      severity: 'error',
      from: { path: '^api/', pathNot: '^api/cli/' },
      to: { path: '^seeds-demo/' },
    },
    {
      name: 'concerns-never-import-features',
      severity: 'error',
      from: { path: '^api/(auth|audit|jobs|storage|mail|metrics|http)/' },
      to: { path: '^api/features/' },
    },
    {
      name: 'web-sees-contracts-and-light',
      severity: 'error',
      from: { path: '^web/' },
      to: {
        path: '^(api|core|database|seeds-demo|tests)/',
        pathNot: '^(api/contracts/|core/light\\.ts$)',
      },
    },
    {
      name: 'web-no-node',
      severity: 'error',
      from: { path: '^web/' },
      to: { dependencyTypes: ['core'] },
    },
    {
      name: 'web-features-never-import-each-other',
      severity: 'error',
      from: { path: '^web/features/([^/]+)/' },
      to: { path: '^web/features/', pathNot: '^web/features/$1/' },
    },
    {
      name: 'web-shared-below-features',
      severity: 'error',
      from: { path: '^web/(charts|components|styles|words)/' },
      to: { path: '^web/(features|routes|main)' },
    },
    {
      name: 'charts-are-pure',
      severity: 'error',
      from: { path: '^web/charts/' },
      to: { path: '^(api|web/components)/' },
    },
    {
      name: 'sealed-has-one-reader',
      severity: 'error',
      from: {
        path: '^(api|database|seeds-demo)/',
        pathNot: '^(api/features/allocation/|database/(entities/sealed|data-source|migrations))',
      },
      to: { path: '^database/entities/sealed/' },
    },
    ...coreFloorRules,
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    parser: 'swc',
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: {
      extensions: ['.ts', '.tsx', '.mjs', '.js', '.json'],
      exportsFields: ['exports'],
      conditionNames: ['import', 'node', 'default', 'types'],
    },
  },
};
