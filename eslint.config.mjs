import vitest from '@vitest/eslint-plugin';
import nextVitals from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';
import boundaries from 'eslint-plugin-boundaries';
import checkFile from 'eslint-plugin-check-file';
import jsdoc from 'eslint-plugin-jsdoc';
import tseslint from 'typescript-eslint';

// A rule is an error or it is off: there is no level of warnings.

/** Folder → kind. The first match wins, so the narrow patterns come first. */
const kinds = {
  'app/**/_components/**': 'component',
  'app/api/**': 'endpoint',
  'app/**': 'page',
  'lib/contracts/**': 'contract',
  'lib/faults/**': 'fault',
  'lib/numerics/**': 'numerics',
  'lib/astro/**': 'astro',
  'lib/photometry/**': 'photometry',
  'lib/formats/**': 'format',
  'lib/server/policy/**': 'policy',
  'lib/server/acts/**': 'act',
  'lib/server/reads/**': 'read',
  'lib/server/data/**': 'data',
  'lib/server/jobs/**': 'queue',
  'lib/server/http/**': 'http',
  'lib/server/identity/**': 'identity',
  'lib/server/mail/**': 'mail',
  'lib/server/{storage,log,settings}/**': 'plumbing',
  'db/seeders/**': 'seeder',
  'db/**': 'db',
  'workers/threads/**': 'thread',
  'workers/**': 'worker',
  'fixtures/**': 'fixture',
  'tests/**': 'test',
};
const science = ['numerics', 'astro', 'photometry'];
const pure = ['contract', 'fault', 'policy', ...science];

/** Who may import whom; everything else is an error. */
const allow = {
  page: ['http', 'page', 'component', 'act', 'read', 'identity', 'contract', 'fault', ...science],
  // Formats as well: headers of FITS files are read in the browser, so that their pixels stay at the telescope.
  component: ['component', 'contract', 'fault', 'format', ...science],
  endpoint: ['endpoint', 'http', 'act', 'read', 'contract', 'fault', 'format'],
  contract: ['contract', 'fault', 'astro', 'photometry'],
  fault: ['fault'],
  numerics: ['numerics', 'fault'],
  astro: ['astro', 'numerics', 'fault'],
  photometry: ['photometry', 'astro', 'numerics', 'fault'],
  format: ['format', 'contract', 'fault', 'astro'],
  policy: ['policy', 'contract', 'fault'],
  // Not other acts: an act that needs another is two acts, or a function of lib/server/data that both use.
  // Of identity they use secrets and sessions; who asks they are told.
  act: ['policy', 'data', 'identity', 'queue', 'mail', 'plumbing', 'contract', 'fault', 'format', ...science],
  read: ['read', 'mail', 'policy', 'data', 'identity', 'plumbing', 'contract', 'fault', 'format', ...science],
  data: ['data', 'policy', 'db', 'contract', 'fault'],
  // A mail is a row of the outbox and a job.
  mail: ['mail', 'data', 'queue', 'policy', 'plumbing', 'contract', 'fault'],
  queue: ['queue', 'data', 'policy', 'contract', 'fault', 'plumbing'],
  identity: ['identity', 'data', 'policy', 'contract', 'fault', 'plumbing'],
  http: ['http', 'identity', 'policy', 'contract', 'fault', 'plumbing', 'data'],
  plumbing: ['plumbing', 'contract', 'fault'],
  db: ['db'],
  // The seeders fill a new database with the code that the application itself uses.
  seeder: [
    'seeder',
    'db',
    'act',
    'data',
    'policy',
    'identity',
    'contract',
    'fault',
    'format',
    'fixture',
    'plumbing',
    ...science,
  ],
  worker: [
    'worker',
    'thread',
    'queue',
    'mail',
    'act',
    'read',
    'policy',
    'contract',
    'fault',
    'format',
    'plumbing',
    ...science,
  ],
  thread: ['thread', 'contract', 'fault', 'format', ...science],
  fixture: ['fixture'],
};

const anyOf = (types) => ({ element: { types: { anyOf: types } } });
const policies = [
  ...Object.entries(allow).map(([from, to]) => ({
    from: { element: { type: from } },
    allow: { to: anyOf(to) },
  })),
  { from: { element: { type: 'test' } }, allow: { to: { element: { type: '*' } } } },
  // A server action is the one door from a component to the server.
  { from: { element: { type: 'component' } }, allow: { to: { file: { categories: 'action' } } } },
  {
    from: { file: { categories: 'action' } },
    allow: { to: anyOf(['http', 'act', 'read', 'identity', 'format']) },
  },
  { from: { file: { categories: 'action' } }, disallow: { to: anyOf(['component', ...science]) } },
  // Packages: free, except where a folder is to stay movable, or a package has one place.
  { allow: { to: { module: { origin: 'external' } } } },
  { allow: { to: { module: { origin: 'core' } } } },
  { from: anyOf([...pure, 'component']), disallow: { to: { module: { origin: 'core' } } } },
  {
    from: anyOf(['format']),
    disallow: { to: { module: { origin: 'core', source: '{node:fs,node:fs/promises}' } } },
  },
  {
    from: anyOf(science),
    disallow: {
      to: { module: { origin: 'external', source: '!(astronomy-engine|mathjs|ml-matrix|ml-regression*)' } },
    },
  },
  {
    from: { element: { type: '!(data|db|seeder|test)' } },
    disallow: { to: { module: { origin: 'external', source: '{sequelize,mariadb}' } } },
  },
  {
    from: { element: { type: '!(page|component|endpoint|http|identity|test)' } },
    disallow: { to: { module: { origin: 'external', source: '{next,react,react-dom}' } } },
  },
];

const restrictedSyntax = [
  {
    selector:
      "CatchClause ThrowStatement > NewExpression[callee.name=/Fault$/]:not(:has(Property[key.name='cause']))",
    message: 'Keep the cause of a caught error.',
  },
  { selector: 'TSEnumDeclaration', message: 'Write a constant list and a union type.' },
];
const noClasses = {
  selector: 'ClassDeclaration',
  message: 'Write functions; classes are for models and Fault.',
};

const source = '{app,lib,db,workers,fixtures,tests}/**/*.{ts,tsx}';

const config = [
  {
    ignores: [
      'node_modules/**',
      '.next/**',
      '.data*/**',
      'public/**',
      'coverage/**',
      'tests/.output/**',
      'next-env.d.ts',
    ],
  },
  ...nextVitals,
  ...nextTypescript,
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  {
    name: 'evenfall/typed',
    files: ['**/*.{ts,tsx}'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    plugins: { '@typescript-eslint': tseslint.plugin },
    rules: {
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      '@typescript-eslint/only-throw-error': 'error',
      '@typescript-eslint/prefer-promise-reject-errors': 'error',
      '@typescript-eslint/return-await': ['error', 'in-try-catch'],
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      // A unit stands at a name's end, after an underscore: `hourAngle_hours`, `mid_jdTdb`.
      '@typescript-eslint/naming-convention': [
        'error',
        {
          selector: ['variable', 'function', 'parameter'],
          modifiers: [],
          format: null,
          custom: { regex: '^_{0,2}[A-Za-z][A-Za-z0-9]*(_[A-Za-z0-9]+)?_?$|^_$', match: true },
        },
        { selector: ['variable', 'parameter'], modifiers: ['destructured'], format: null },
        { selector: 'typeLike', format: ['PascalCase'] },
      ],
    },
  },
  {
    name: 'evenfall/no-unchecked-values',
    files: ['{app,lib,db,workers}/**/*.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'error',
      '@typescript-eslint/no-unsafe-argument': 'error',
      '@typescript-eslint/no-unsafe-call': 'error',
      '@typescript-eslint/no-unsafe-member-access': 'error',
      '@typescript-eslint/no-unsafe-return': 'error',
      '@typescript-eslint/no-implied-eval': 'error',
      '@typescript-eslint/no-redundant-type-constituents': 'error',
      '@typescript-eslint/restrict-plus-operands': 'error',
    },
  },
  {
    name: 'evenfall/sizes',
    files: [source],
    rules: {
      'max-lines': ['error', { max: 400, skipBlankLines: true, skipComments: true }],
      'max-lines-per-function': ['error', { max: 80, skipBlankLines: true, skipComments: true }],
      'max-params': ['error', 4],
      'no-restricted-syntax': ['error', ...restrictedSyntax, noClasses],
      eqeqeq: ['error', 'always'],
      'no-empty': 'error',
    },
  },
  {
    files: ['lib/numerics/**'],
    rules: { 'max-lines-per-function': ['error', { max: 120, skipBlankLines: true, skipComments: true }] },
  },
  { files: ['tests/**'], rules: { 'max-lines-per-function': 'off' } },
  {
    files: ['db/models/**', 'lib/faults/**'],
    rules: { 'no-restricted-syntax': ['error', ...restrictedSyntax] },
  },
  { files: ['{app,lib}/**/*.{ts,tsx}'], rules: { 'no-console': 'error' } },
  {
    name: 'evenfall/names-of-files',
    files: [source],
    // Migrations begin with their number.
    ignores: ['db/migrations/**'],
    plugins: { 'check-file': checkFile },
    rules: {
      'check-file/filename-naming-convention': [
        'error',
        { '**/*.{ts,tsx}': 'KEBAB_CASE' },
        { ignoreMiddleExtensions: true },
      ],
      'check-file/folder-naming-convention': [
        'error',
        { 'app/**/': 'NEXT_JS_APP_ROUTER_CASE', '{lib,db,workers,fixtures,tests}/**/': 'KEBAB_CASE' },
      ],
      'check-file/filename-blocklist': [
        'error',
        { '**/index.{ts,tsx}': '*.ts', '**/{util,utils,helper,helpers,misc}.{ts,tsx}': '*.ts' },
      ],
    },
  },
  {
    name: 'evenfall/boundaries',
    files: [source],
    plugins: { boundaries },
    settings: {
      'import/resolver': { typescript: { project: './tsconfig.json' } },
      'boundaries/files': [{ category: 'action', pattern: 'app/**/actions.ts' }],
      'boundaries/elements': Object.entries(kinds).map(([pattern, type]) => ({
        type,
        pattern,
        partialMatch: false,
      })),
    },
    rules: {
      // A new folder must say what it is.
      'boundaries/no-unknown-files': 'error',
      'boundaries/dependencies': [
        'error',
        { default: 'disallow', checkAllOrigins: true, checkInternals: true, policies },
      ],
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            { regex: '^@/app/.+/_components/', message: 'A route’s components are private to that route.' },
            { regex: '(^|/)(utils?|helpers?|misc)$', message: 'Name the file after what it does.' },
          ],
        },
      ],
    },
  },
  {
    name: 'evenfall/science',
    files: ['lib/{numerics,astro,photometry}/**/*.ts'],
    plugins: { jsdoc },
    rules: {
      '@typescript-eslint/no-non-null-assertion': 'off',
      'no-restricted-globals': ['error', 'process', 'Buffer', 'fetch', 'performance', 'setTimeout'],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'Time comes as an argument.' },
        {
          object: 'Math',
          property: 'random',
          message: 'Chance comes from a seeded generator that is passed in.',
        },
      ],
      'jsdoc/require-jsdoc': ['error', { publicOnly: true, require: { FunctionDeclaration: true } }],
      'jsdoc/check-tag-names': ['error', { definedTags: ['source', 'shape', 'accuracy'] }],
      'jsdoc/check-param-names': 'error',
      'jsdoc/no-restricted-syntax': [
        'error',
        {
          contexts: [
            {
              context: 'ExportNamedDeclaration[declaration.type=FunctionDeclaration]',
              comment: 'JsdocBlock:not(*:has(JsdocTag[tag=source]))',
              message: 'A public science function names its @source.',
            },
          ],
        },
      ],
    },
  },
  {
    name: 'evenfall/tests',
    files: ['tests/**/*.{ts,tsx}'],
    plugins: { vitest },
    rules: {
      ...vitest.configs.recommended.rules,
      'vitest/expect-expect': ['error', { assertFunctionNames: ['expect*', 'assert*', 'fc.assert'] }],
      // The second argument is the message of a failure.
      'vitest/valid-expect': ['error', { maxArgs: 2 }],
      'vitest/no-focused-tests': 'error',
      'vitest/no-disabled-tests': 'error',
      'no-restricted-syntax': [
        'error',
        ...restrictedSyntax,
        {
          selector: "CallExpression[callee.property.name='toBeCloseTo']",
          message: 'Use expectWithin or expectDigits: a tolerance has a name and a unit.',
        },
        {
          selector: "CallExpression[callee.object.name='vi'][callee.property.name=/^(mock|doMock)$/]",
          message: 'Our own modules are not mocked; make a fake of what lies outside.',
        },
      ],
    },
  },
  { files: ['**/*.mjs'], ...tseslint.configs.disableTypeChecked },
];

export default config;
