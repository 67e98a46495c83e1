import js from '@eslint/js';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

/**
 * Who may import whom, and what may be used where. A rule set later replaces one set earlier for the same file, so the
 * arrows are one table: each file falls under exactly one row, and a row names everything that it forbids.
 */

const SPECS = ['**/*.spec.{ts,tsx,mjs}', '**/*.e2e.ts'];
const TEST_CODE = [
  ...SPECS,
  'frontend/e2e/**',
  'frontend/src/testing/**',
  'backend/src/testing/**',
  'jobs/src/testing/**',
];

/** A package outside our own, by name or path: `forbid.packagesExcept('zod')`. */
const forbid = {
  packagesExcept: (...allowed) =>
    `^(?!\\.{1,2}/|@stayledger/${allowed.map((name) => `|${name}$|${name}/`).join('')})`,
  /** Folders beside or above, of the same source tree: `../contracts/…`, `../../contracts/…`. */
  folders: (...names) => `^(\\.\\./)+(${names.join('|')})/`,
  /** The front end's shell, of which everybody may use the table of paths. */
  shell: '^(\\.\\./)+app/(?!paths(\\.js)?$)',
  /** Parts of one of our workspaces. */
  workspace: (name, path = '') => `^@stayledger/${name}${path ? `/${path}` : '(/|$)'}`,
  /** Reaching into another workspace by path instead of by its name. */
  workspacePaths: `^(\\.\\./)+((shared|backend|jobs|frontend)/(src|dist|setup)|reference-data)/`,
};

const OWN_NAME = {
  regex: forbid.workspacePaths,
  message: 'Import another workspace by its name: @stayledger/<workspace>/<path>.',
};
const NO_SERVER_IN_BROWSER = {
  regex: `${forbid.workspace('(backend|jobs)')}|^node:|^@nestjs/|^@mikro-orm/|^bull$|^ioredis`,
  message: 'The browser talks to the server over HTTP: use src/lib/api-client and the contracts.',
};
const NO_QUEUES_IN_BROWSER = {
  regex: forbid.workspace('shared', 'queues'),
  message: 'Queues are the server side; follow the job row through the jobs contract.',
};
const PURE = 'is pure: it takes numbers and gives numbers, without files, clock, schemas or network.';

/** One row per place. `forbids` is a list of `[pattern, what to do instead]`. */
const ARROWS = [
  {
    files: ['shared/src/units/**'],
    forbids: [
      ['^(?!\\./)', 'shared/units is the bottom: it imports nothing. Put what needs more beside its user.'],
    ],
  },
  {
    files: ['shared/src/fatigue/**'],
    forbids: [
      [
        forbid.packagesExcept('simple-statistics'),
        `shared/fatigue ${PURE} Pass what you need as an argument.`,
      ],
      [
        forbid.folders('contracts', 'permissions', 'queues', 'rig', 'rerig-schedule', 'wind'),
        'shared/fatigue may import shared/units only; whoever calls it translates contracts into numbers.',
      ],
    ],
  },
  {
    // rig, rerig-schedule, wind, and whatever else is calculated.
    files: ['shared/src/**'],
    except: ['units', 'fatigue', 'permissions', 'contracts', 'queues'].map((name) => `shared/src/${name}/**`),
    forbids: [
      [
        forbid.packagesExcept('simple-statistics'),
        `This part of shared ${PURE} Pass what you need as an argument.`,
      ],
      [forbid.folders('contracts', 'permissions', 'queues'), 'Import shared/units and shared/fatigue only.'],
    ],
  },
  {
    files: ['shared/src/permissions/**'],
    forbids: [
      [forbid.packagesExcept(), 'The permission table is plain data, read by server and browser alike.'],
      [
        forbid.folders('contracts', 'fatigue', 'queues', 'rig', 'rerig-schedule', 'wind'),
        'The permission table imports nothing.',
      ],
    ],
  },
  {
    files: ['shared/src/contracts/**'],
    forbids: [
      [forbid.packagesExcept('zod'), 'A contract is Zod and nothing else.'],
      [
        forbid.folders('fatigue', 'queues', 'rig', 'rerig-schedule', 'wind'),
        'What goes over the wire must not change because a calculation did: write the shape here, translate in the server.',
      ],
    ],
  },
  {
    files: ['shared/src/queues/**'],
    forbids: [
      [
        forbid.packagesExcept('zod'),
        'shared/queues holds names and payloads; Bull and Nest stay in backend/src/queue.',
      ],
      [
        forbid.folders('fatigue', 'rig', 'rerig-schedule', 'wind'),
        'A payload holds ids; the handler in jobs loads the rest.',
      ],
    ],
  },
  {
    files: ['reference-data/**'],
    forbids: [
      [
        forbid.workspace('(backend|jobs|frontend)'),
        'Reference data are plain data; their spec may use shared only.',
      ],
    ],
  },
  {
    files: ['backend/src/**'],
    except: ['backend/src/common/**'],
    forbids: [
      [forbid.workspace('jobs'), 'The API knows a job by its name and payload: add to shared/queues.'],
      [forbid.workspace('frontend'), 'The server does not know the web application.'],
    ],
  },
  {
    files: ['backend/src/common/**'],
    forbids: [
      [forbid.workspace('(jobs|frontend)'), 'backend/common knows neither jobs nor the web application.'],
      [
        '^\\.\\./\\.\\./(?!config/|database/|auth/|.*\\.entity(\\.js)?$)',
        'backend/common knows no feature (entities and the principal of auth aside): hand over what it needs, or move the code to the feature.',
      ],
    ],
  },
  {
    files: ['jobs/src/**'],
    except: ['jobs/src/all-in-one.ts'],
    forbids: [
      [
        forbid.workspace(
          'backend',
          '(?!(persistence|storage|config|database|queue|common|ledger|life|testing)(/|$))(?!.*\\.entity$)',
        ),
        'Jobs use entities, persistence, queue, storage, config, common, and the domain functions of ledger and life; a controller or service of the API is not for them.',
      ],
      [forbid.workspace('frontend'), 'Jobs do not know the web application.'],
    ],
  },
  {
    files: ['jobs/src/all-in-one.ts'],
    forbids: [
      [
        forbid.workspace('backend', '(?!(app|persistence|storage|config|database|queue|common)(/|$|\\.))'),
        'The all-in-one process joins the API (@stayledger/backend/app) and the jobs; features stay behind these two.',
      ],
    ],
  },
  {
    files: ['frontend/src/theme/**'],
    forbids: [
      [
        forbid.folders('app', 'pages', 'features', 'components'),
        'The theme is below everything that is drawn.',
      ],
    ],
    browser: true,
  },
  {
    files: ['frontend/src/lib/**'],
    forbids: [
      [
        forbid.folders('app', 'pages', 'features', 'components'),
        'lib is below components, features and pages.',
      ],
    ],
    browser: true,
  },
  {
    files: ['frontend/src/components/**'],
    forbids: [
      [
        forbid.folders('app', 'pages', 'features'),
        'A component knows no feature: take what differs as a property, or move it to the feature.',
      ],
    ],
    browser: true,
  },
  {
    files: ['frontend/src/features/*/*'],
    forbids: [
      [forbid.folders('pages'), 'Pages compose features, not the other way round.'],
      [forbid.shell, 'Features know the paths of the application, not its shell.'],
      [
        '^\\.\\./(?!\\.\\./)(?!.*\\.(queries|mutations)(\\.js)?$)',
        'Another feature opens its *.queries and *.mutations only; let the page compose both, or move the piece to src/components.',
      ],
    ],
    browser: true,
  },
  {
    files: ['frontend/src/features/*/*/**'],
    forbids: [
      [forbid.folders('pages'), 'Pages compose features, not the other way round.'],
      [forbid.shell, 'Features know the paths of the application, not its shell.'],
      [
        '^\\.\\./\\.\\./(?!\\.\\./)(?!.*\\.(queries|mutations)(\\.js)?$)',
        'Another feature opens its *.queries and *.mutations only; let the page compose both, or move the piece to src/components.',
      ],
    ],
    browser: true,
  },
  {
    files: ['frontend/src/pages/**'],
    forbids: [[forbid.shell, 'A page knows the paths of the application, not its shell.']],
    browser: true,
  },
  {
    files: ['frontend/src/app/**', 'frontend/src/testing/**', 'frontend/src/*'],
    forbids: [
      [
        '^antd$|^antd/(es|lib)$',
        'The shell is on every page: import antd by component (antd/es/…), or the whole library lands in the first download.',
      ],
    ],
    browser: true,
  },
];

const arrowRules = ARROWS.map(({ files, except = [], forbids, browser }) => ({
  name: `arrows of ${files[0]}`,
  files,
  // A test may bring its own tools and look at several layers at once.
  ignores: [...except, ...TEST_CODE],
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          ...forbids.map(([regex, message]) => ({ regex, message })),
          ...(browser ? [NO_SERVER_IN_BROWSER, NO_QUEUES_IN_BROWSER] : []),
          OWN_NAME,
        ],
      },
    ],
  },
}));

// What may be used where: the same one-row rule, with selectors instead of imports.
const NO_CLOCK = [
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'Ask the Clock for the time, or take it as an argument: a result must be repeatable.',
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'Ask the Clock for the time, or take it as an argument: a result must be repeatable.',
  },
  {
    selector: "CallExpression[callee.name='Date']",
    message: 'Ask the Clock for the time, or take it as an argument: a result must be repeatable.',
  },
];
const NO_CHANCE = {
  selector: "MemberExpression[object.name='Math'][property.name='random']",
  message: 'Take a random generator as an argument, or use node:crypto for secrets.',
};
const NO_ENVIRONMENT = {
  selector: "MemberExpression[object.name='process'][property.name='env']",
  message: 'The environment is read in backend/src/config/env.ts; take the setting from there.',
};
const HEX_COLOUR = '/#([0-9a-fA-F]{3,4}|[0-9a-fA-F]{6}|[0-9a-fA-F]{8})(?![0-9a-zA-Z_-])/';
const NO_COLOUR = ['Literal[value=', 'TemplateElement[value.raw='].map((start) => ({
  selector: `${start}${HEX_COLOUR}]`,
  message: 'Colours live in frontend/src/theme; read a token.',
}));
const NO_GAP_IN_TESTS = [
  {
    selector:
      'MemberExpression[object.name=/^(it|test|describe)$/][property.name=/^(only|skip|todo|failing)$/]',
    message: 'A test that is left out, or leaves others out, must not be committed.',
  },
  {
    // With a title before it: a helper may well be called `fit`.
    selector:
      'CallExpression[callee.name=/^(fit|xit|fdescribe|xdescribe|xtest)$/][arguments.0.type=/^(Literal|TemplateLiteral)$/]',
    message: 'A test that is left out, or leaves others out, must not be committed.',
  },
];
const CLOCKS = ['backend/src/common/clock/clock.ts', 'frontend/src/lib/clock.ts'];

const usage = (name, files, ignores, selectors) => ({
  name,
  files,
  ignores,
  rules: { 'no-restricted-syntax': ['error', ...selectors] },
});

export default tseslint.config(
  { name: 'not ours to check', ignores: ['**/node_modules/', '**/dist/', '**/coverage/', '.data/'] },
  { ...js.configs.recommended, files: ['**/*.{mjs,cjs,js,ts,tsx}'] },
  ...tseslint.configs.recommended.map((config) => ({ ...config, files: ['**/*.{ts,tsx}'] })),
  {
    name: 'everywhere',
    files: ['**/*.{mjs,cjs,js,ts,tsx}'],
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx'], location: 'anywhere' }],
    },
  },
  {
    name: 'typescript',
    files: ['**/*.{ts,tsx}'],
    rules: {
      // A leading underscore says: known, and left alone on purpose.
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  {
    name: 'published figures',
    files: SPECS,
    // They are given with all the digits of their source, also those a double cannot hold.
    rules: { 'no-loss-of-precision': 'off' },
  },
  {
    name: 'types only where only types are meant',
    files: ['shared/src/**/*.ts', 'frontend/src/**/*.{ts,tsx}'],
    // Not in backend and jobs: injection reads constructor types at run time.
    rules: { '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }] },
  },
  {
    // Needs the type checker and doubles the time of lint: worth it where a forgotten `await` loses work, or makes a
    // test pass that checked nothing.
    name: 'promises are waited for',
    files: ['{backend,jobs}/src/**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': 'error',
      '@typescript-eslint/await-thenable': 'error',
    },
  },
  {
    name: 'plain Node scripts',
    files: ['**/*.{mjs,cjs}'],
    languageOptions: {
      globals: Object.fromEntries(
        [
          'process',
          'console',
          'setTimeout',
          'clearTimeout',
          'setInterval',
          'clearInterval',
          'setImmediate',
          'performance',
          'Buffer',
          'URL',
          'fetch',
          'AbortSignal',
          'AbortController',
        ].map((name) => [name, 'readonly']),
      ),
    },
  },
  {
    name: 'CommonJS scripts',
    files: ['**/*.cjs'],
    languageOptions: {
      sourceType: 'commonjs',
      globals: Object.fromEntries(
        ['require', 'module', 'exports', '__dirname', '__filename'].map((name) => [name, 'readonly']),
      ),
    },
  },
  { name: 'hooks', files: ['frontend/src/**/*.{ts,tsx}'], ...reactHooks.configs.flat.recommended },
  ...arrowRules,
  usage(
    'server',
    ['{backend,jobs}/src/**/*.ts'],
    [...TEST_CODE, ...CLOCKS, 'backend/src/config/env.ts'],
    [...NO_CLOCK, NO_CHANCE, NO_ENVIRONMENT],
  ),
  usage('shared', ['shared/src/**/*.ts'], TEST_CODE, [...NO_CLOCK, NO_CHANCE, NO_ENVIRONMENT]),
  usage('the reader of the environment', ['backend/src/config/env.ts'], [], [...NO_CLOCK, NO_CHANCE]),
  usage(
    'web application',
    ['frontend/src/**/*.{ts,tsx}'],
    [...TEST_CODE, ...CLOCKS, 'frontend/src/theme/**'],
    [...NO_CLOCK, NO_CHANCE, NO_ENVIRONMENT, ...NO_COLOUR],
  ),
  usage('theme', ['frontend/src/theme/**'], TEST_CODE, [...NO_CLOCK, NO_CHANCE, NO_ENVIRONMENT]),
  usage('the clocks', CLOCKS, [], [NO_CHANCE, NO_ENVIRONMENT]),
  usage('tests', TEST_CODE, [], NO_GAP_IN_TESTS),
);
