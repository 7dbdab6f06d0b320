// Lint is the architecture's guard: every rule about who may import whom says what to do instead.
import tseslint from 'typescript-eslint';
import reactHooks from 'eslint-plugin-react-hooks';

/** One import ban with its advice. `regex` is matched against the import path as written. */
const ban = (regex, message) => ({ regex, message });
const noImports = (...patterns) => ({ 'no-restricted-imports': ['error', { patterns }] });

const clockAndChance = [
  {
    selector: "MemberExpression[object.name='Date'][property.name='now']",
    message: 'shared/science has no clock: take the time as an argument.',
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'shared/science has no clock: take the time as an argument.',
  },
  {
    selector: "MemberExpression[object.name='Math'][property.name='random']",
    message: 'shared/science has no chance: take the numbers as an argument.',
  },
];
const numberText = [
  {
    selector:
      'CallExpression[callee.property.name=/^(toFixed|toLocaleString|toLocaleDateString|toLocaleTimeString|toPrecision)$/]',
    message:
      'Numbers and dates become text in shared/format only: use formatNumber, formatWithUncertainty or formatDateTime.',
  },
];
const processEnv = [
  {
    selector: "MemberExpression[object.name='process'][property.name='env']",
    message: 'server/config.ts is the only reader of the environment: import { config } from it.',
  },
];
const emit = [
  {
    selector: "CallExpression[callee.property.name='emit']",
    message: 'Only server/realtime/broadcast.ts emits: call broadcastChanged or broadcastReadings.',
  },
];
const rawSql = [
  {
    selector: "CallExpression[callee.object.name='sequelize'][callee.property.name='query']",
    message: 'Raw SQL lives in queries.ts (or a migration): move it there.',
  },
];

const up = (name) => `(^|\\.\\./)+${name}/`;

export default tseslint.config(
  { ignores: ['node_modules/', '**/dist/', '.data/', 'coverage/'] },
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.base],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': 'error',
      'no-console': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'prefer-const': 'error',
      'no-restricted-syntax': ['error', ...processEnv, ...emit, ...rawSql, ...numberText],
    },
  },
  {
    files: ['shared/science/**'],
    rules: {
      'no-restricted-syntax': ['error', ...processEnv, ...emit, ...numberText, ...clockAndChance],
      ...noImports(
        ban('^\\.\\./', 'shared/science imports nothing of ours outside its own folder.'),
        ban(
          '^(zod|react|node:|pg|sequelize)',
          'shared/science is pure arithmetic: no I/O, no schemas, no views.',
        ),
      ),
    },
  },
  {
    files: ['shared/contracts/**'],
    rules: noImports(
      ban('^\\.\\./(?!science/)', 'Contracts import zod, each other and science types only.'),
      ban('^(react|node:|pg|sequelize)', 'Contracts are the wire: zod only.'),
    ),
  },
  {
    files: ['shared/format/**'],
    rules: {
      'no-restricted-syntax': ['error', ...processEnv, ...emit],
      ...noImports(
        ban('^\\.\\./(?!science/|contracts/)', 'shared/format imports science and contract types only.'),
      ),
    },
  },
  {
    files: ['client/**'],
    rules: {
      ...reactHooks.configs.recommended.rules,
      ...noImports(
        ban(
          up('server'),
          'The client talks to the server over HTTP and the socket only: put what both need into shared/.',
        ),
        ban(up('simulator'), 'The simulator speaks only MQTT.'),
      ),
    },
    plugins: { 'react-hooks': reactHooks },
  },
  {
    files: ['client/src/components/**', 'client/src/lib/**'],
    rules: noImports(
      ban('/features/', 'components/ and lib/ know no domain: pass what is needed as props.'),
      ban('/routes/', 'components/ and lib/ know no page.'),
      ban(up('server'), 'The client talks to the server over HTTP and the socket only.'),
    ),
  },
  {
    files: ['client/src/features/**'],
    rules: noImports(
      ban(
        '^\\.\\./(\\.\\./)?(?!\\.\\./)(?!components|lib|paths)[a-z-]+/(api|model|components)',
        'A feature never imports another feature: compose them in routes/, or move the shared part to components/ or shared/.',
      ),
      ban('/routes/', 'Pages compose features, never the other way round.'),
      ban(up('server'), 'The client talks to the server over HTTP and the socket only.'),
    ),
  },
  {
    files: ['server/**'],
    rules: noImports(
      ban('/client/', 'The server never imports the client.'),
      ban('/simulator/', 'The simulator speaks only MQTT.'),
    ),
  },
  {
    files: ['server/lib/**'],
    rules: noImports(ban('^\\.\\./', 'server/lib holds no domain words and imports nothing of ours.')),
  },
  {
    files: ['server/features/*/policy.ts', 'server/features/*/presenter.ts'],
    rules: {
      'no-restricted-syntax': ['error', ...processEnv, ...emit, ...rawSql, ...numberText, ...clockAndChance],
    },
  },
  {
    files: ['server/features/*/routes.ts'],
    rules: noImports(
      ban('/db/', 'Routes reach the database through their service.'),
      ban('/realtime/', 'Services broadcast after commit, routes do not.'),
    ),
  },
  {
    files: ['server/config.ts'],
    rules: { 'no-restricted-syntax': ['error', ...emit, ...rawSql, ...numberText] },
  },
  {
    files: ['server/realtime/broadcast.ts'],
    rules: { 'no-restricted-syntax': ['error', ...processEnv, ...rawSql, ...numberText] },
  },
  {
    files: ['server/**/queries.ts', 'server/db/**'],
    rules: { 'no-restricted-syntax': ['error', ...processEnv, ...emit, ...numberText] },
  },
  {
    files: ['simulator/**'],
    rules: {
      'no-console': 'off',
      'no-restricted-syntax': ['error', ...emit],
      ...noImports(
        ban(up('server'), 'The simulator speaks only MQTT: it may import shared/ and nothing else of ours.'),
        ban(up('client'), 'The simulator speaks only MQTT.'),
      ),
    },
  },
  { files: ['scripts/**', 'tests/**'], rules: { 'no-console': 'off', 'no-restricted-syntax': 'off' } },
);
