import { readdirSync } from 'node:fs';
import js from '@eslint/js';
import { createNodeResolver, importX } from 'eslint-plugin-import-x';
import reactHooks from 'eslint-plugin-react-hooks';
import globals from 'globals';
import tseslint from 'typescript-eslint';

const foldersIn = (folder) =>
  readdirSync(new URL(folder, import.meta.url), { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name);

const clientFeatures = foldersIn('./client/features');
const serverFeatures = foldersIn('./server/features');

/** Who may import whom. Each message names the right way; a test proves that these rules bite. */
const zones = [
  {
    target: './shared',
    from: ['./client', './server', './jobs', './tests'],
    message: 'shared/ knows nobody: hand in what it needs as an argument.',
  },
  {
    target: './client',
    from: ['./server', './jobs', './tests'],
    message: 'The client talks to the server over HTTP; what both need lives in shared/.',
  },
  {
    target: './server',
    from: ['./client', './tests'],
    message: 'The server knows neither its client nor its tests.',
  },
  {
    // The demo alone runs the jobs, to have its days pass.
    target: ['features', 'routing', 'middleware', 'integrations', 'models', 'emails'].map(
      (name) => `./server/${name}`,
    ),
    from: './jobs',
    message: 'What a job and a route both need is a command in server/features.',
  },
  {
    target: './jobs',
    from: ['./client', './tests', './server/routing', './server/middleware', './server/app.ts'],
    message: 'A job calls commands and queries of server/features.',
  },
  {
    target: './server/models',
    from: ['./server/features', './server/integrations', './server/middleware', './server/routing'],
    message: 'A model is a table: rules belong to commands or shared/.',
  },
  {
    target: './server/integrations',
    from: ['./server/models', './server/features', './server/database'],
    message: 'An integration knows its SDK, the environment and shared/.',
  },
  {
    target: './client/components',
    from: ['./client/features', './client/routes', './client/app'],
    message: 'A component is handed what it shows; compose in a route.',
  },
  {
    target: './client/components/ui',
    from: './client/components/figures',
    message: 'ui/ knows no domain word: figures import ui, never the reverse.',
  },
  {
    target: './client/lib',
    from: ['./client/features', './client/routes', './client/app', './client/components'],
    message: 'lib/ is the ground floor.',
  },
  {
    target: './client/features',
    from: ['./client/routes', './client/app'],
    message: 'Routes compose features, not the reverse.',
  },
  ...clientFeatures.map((feature) => ({
    target: `./client/features/${feature}`,
    from: './client/features',
    except: [`./${feature}`],
    message:
      'One feature does not reach into another: lift it to components/ or lib/, or compose in a route.',
  })),
  ...serverFeatures.map((feature) => ({
    target: `./server/features/${feature}`,
    from: `./server/features/!(${feature})/**/*-{routes,policy,presenter}.ts`,
    message: 'Of another feature take a command or a query, never its routes, policy or presenter.',
  })),
];

const MEASURE = /(minor|amount|price|gram|mass|fineness|permille|usd|ounce|percent|total|sum)s?$/i;

function namesOf(node) {
  if (node === null || node === undefined) return [];
  if (node.type === 'Identifier') return [node.name];
  if (node.type === 'MemberExpression') return [...namesOf(node.property), ...namesOf(node.object)];
  if (node.type === 'CallExpression') return [...namesOf(node.callee), ...node.arguments.flatMap(namesOf)];
  if (node.type === 'BinaryExpression') return [...namesOf(node.left), ...namesOf(node.right)];
  return [];
}

/** In shared/ `toFixed` is the exact one of a Decimal; drawings turn a finished figure into a place on the screen. */
const isDecimalGround = (file) => file.startsWith(`${import.meta.dirname}/shared/`);

/** Money and measures are decimals or integers: a binary float never carries one. */
const noFloatMeasures = {
  meta: {
    type: 'problem',
    schema: [],
    messages: {
      float: '{{ call }} makes a float of a money or measure value; use shared/decimal.ts or bigint.',
    },
  },
  create: (context) => ({
    CallExpression(node) {
      const { callee } = node;
      const isMethod = callee.type === 'MemberExpression' && callee.property.type === 'Identifier';
      const call = callee.type === 'Identifier' ? callee.name : isMethod ? callee.property.name : '';
      const isMath = isMethod && callee.object.type === 'Identifier' && callee.object.name === 'Math';
      if (call === 'parseFloat' || (call === 'toFixed' && !isDecimalGround(context.filename)))
        context.report({ node, messageId: 'float', data: { call } });
      const suspect = call === 'Number' || (isMath && ['round', 'floor', 'ceil', 'trunc'].includes(call));
      if (suspect && node.arguments.flatMap(namesOf).some((name) => MEASURE.test(name))) {
        context.report({ node, messageId: 'float', data: { call } });
      }
    },
  }),
};

const house = { rules: { 'no-float-measures': noFloatMeasures } };

export default tseslint.config(
  { ignores: ['node_modules', 'dist', '.data', 'coverage'] },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    languageOptions: { parserOptions: { project: './tsconfig.json', tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { attributes: false, arguments: false, properties: false } },
      ],
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { fixStyle: 'separate-type-imports', disallowTypeAnnotations: false, prefer: 'type-imports' },
      ],
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
    },
  },
  {
    plugins: { 'import-x': importX, house },
    settings: {
      'import-x/resolver-next': [createNodeResolver({ extensions: ['.ts', '.tsx', '.js', '.mjs', '.json'] })],
    },
    rules: {
      'import-x/no-restricted-paths': ['error', { basePath: import.meta.dirname, zones }],
      'import-x/no-default-export': 'error',
      'import-x/no-cycle': 'off',
      eqeqeq: ['error', 'always'],
      'no-console': 'error',
      'max-lines': ['error', { max: 400, skipBlankLines: false, skipComments: false }],
    },
  },
  {
    files: ['client/**/*.{ts,tsx}'],
    plugins: { 'react-hooks': reactHooks },
    languageOptions: { globals: globals.browser },
    rules: {
      'react-hooks/rules-of-hooks': 'error',
      'react-hooks/exhaustive-deps': 'error',
      'react/no-danger': 'off',
    },
  },
  { files: ['client/public/*.js'], languageOptions: { globals: globals.browser } },
  {
    files: ['server/**/*.ts', 'jobs/**/*.ts', 'shared/**/*.ts', 'client/**/*.{ts,tsx}'],
    ignores: ['**/*.test.ts', '**/*.test.tsx', 'client/**/*-geometry.ts'],
    rules: {
      'house/no-float-measures': 'error',
      'max-lines-per-function': ['error', { max: 150, skipBlankLines: true, skipComments: true }],
    },
  },
  {
    files: ['shared/**/*.ts'],
    ignores: ['**/*.test.ts', '**/*.test-d.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            {
              regex: '^(?!\\.{1,2}/|#shared/|decimal\\.js$|zod$).+',
              message: 'shared/ imports decimal.js, zod and itself.',
            },
          ],
        },
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'Time comes in as an argument.' },
        { object: 'Math', property: 'random', message: 'Ids come in as arguments.' },
      ],
      'no-restricted-globals': ['error', { name: 'process', message: 'shared/ reads no environment.' }],
    },
  },
  {
    files: ['server/**/*.ts', 'jobs/**/*.ts'],
    ignores: ['server/integrations/**', '**/*.test.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          paths: ['stripe', 'nodemailer', '@aws-sdk/client-s3'].map((name) => ({
            name,
            message: 'Only server/integrations imports an SDK.',
          })),
        },
      ],
    },
  },
  {
    files: ['server/**/*.ts', 'jobs/**/*.ts'],
    ignores: ['server/database/transaction.ts', '**/*.test.ts'],
    rules: {
      'no-restricted-syntax': [
        'error',
        {
          selector: "CallExpression[callee.property.name='transaction'][callee.object.name='sequelize']",
          message: 'withTransaction is the only way to write.',
        },
      ],
    },
  },
  {
    files: ['server/bin/**/*.mjs', 'eslint.config.js'],
    languageOptions: { globals: globals.node },
    rules: { 'no-console': 'off' },
  },
  {
    files: ['*.config.ts', 'eslint.config.js'],
    rules: { 'import-x/no-default-export': 'off', 'max-lines': 'off' },
  },
  {
    files: ['tests/setup/*.ts', 'tests/bench/**'],
    rules: { 'import-x/no-default-export': 'off', 'no-console': 'off' },
  },
  {
    files: ['**/*.test.{ts,tsx}', '**/*.spec.ts'],
    rules: { 'max-lines': ['error', 600], 'import-x/no-restricted-paths': 'off' },
  },
);
