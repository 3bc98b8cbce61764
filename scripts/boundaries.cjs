/**
 * Who may import whom. What is absent is forbidden: each folder lists the folders of ours that it may use.
 * Pages and worker are two doors into the same server; the server uses lib; lib uses nothing.
 */
const lib = (...names) => names.map((name) => `src/lib/${name}/`);
const server = (...names) => names.map((name) => `src/server/${name}`);
const SERVER_BASE = server('env.ts', 'errors.ts', 'logger.ts', 'clock.ts', 'requestContext.ts');
const ALL_LIB = ['src/lib/'];

const MAY_USE = {
  'src/lib/units/': [],
  'src/lib/statistics/': lib('units'),
  'src/lib/motor/': lib('units'),
  'src/lib/format/': lib('units'),
  'src/lib/signal/': lib('units', 'statistics'),
  'src/lib/analysis/': lib('signal', 'motor', 'statistics', 'units'),
  'src/lib/schemas/': lib('units', 'analysis'),
  'src/components/ui/': [],
  'src/components/charts/': ['src/components/ui/', ...ALL_LIB],
  'src/client/': ALL_LIB,
  'src/components/(?!ui/|charts/)': ['src/components/', 'src/client/', ...ALL_LIB],
  'src/layouts/': ['src/components/', 'src/styles/', ...ALL_LIB, 'src/http/', ...server('usecases/', 'presenters/')],
  'src/pages/': [
    'src/layouts/',
    'src/components/',
    'src/styles/',
    ...ALL_LIB,
    'src/http/',
    ...server('usecases/', 'presenters/', 'policies/', 'errors.ts', 'metrics.ts'),
  ],
  'src/http/': [...ALL_LIB, 'src/server/'],
  'src/middleware.ts': [...ALL_LIB, 'src/http/', 'src/server/'],
  'src/server/database/': [...SERVER_BASE, ...lib('schemas')],
  'src/server/models/': [...server('database/'), ...SERVER_BASE, ...ALL_LIB],
  'src/server/policies/': [...server('models/'), ...SERVER_BASE, ...ALL_LIB],
  'src/server/storage/': SERVER_BASE,
  'src/server/queue/': [...SERVER_BASE, ...ALL_LIB],
  'src/server/media/': [...SERVER_BASE, ...ALL_LIB],
  'src/server/auth/': [...server('models/', 'database/', 'policies/'), ...SERVER_BASE, ...ALL_LIB],
  'src/server/presenters/': [...server('models/', 'policies/'), ...ALL_LIB],
  'src/server/usecases/': [
    ...server('models/', 'policies/', 'database/', 'storage/', 'queue/', 'media/', 'auth/'),
    ...SERVER_BASE,
    ...ALL_LIB,
  ],
  'worker/': ['src/server/', ...ALL_LIB],
  'scripts/': ['src/server/', 'worker/', ...ALL_LIB],
};

const escape = (path) => path.replaceAll('.', '\\.');

module.exports = {
  forbidden: [
    {
      name: 'no-circular',
      severity: 'error',
      from: {},
      to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
    },
    {
      name: 'no-orphan-target',
      severity: 'error',
      from: {},
      to: { couldNotResolve: true, pathNot: '^(astro:|virtual:)' },
    },
    ...Object.entries(MAY_USE).map(([from, allowed]) => ({
      name: `${from} may use only what is listed for it`,
      severity: 'error',
      from: { path: `^${from}` },
      to: {
        path: '^(src|worker|scripts|tests)/',
        pathNot: [`^${from}`, ...allowed.map((path) => `^${escape(path)}`)].join('|'),
      },
    })),
  ],
  options: {
    doNotFollow: { path: 'node_modules' },
    tsPreCompilationDeps: true,
    tsConfig: { fileName: 'tsconfig.json' },
    enhancedResolveOptions: { exportsFields: ['exports'], conditionNames: ['import', 'node', 'default'] },
  },
};
