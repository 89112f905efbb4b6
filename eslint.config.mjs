import nextCoreWebVitals from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';

/**
 * The rooms of the house and what each may import of the others (DEVELOPERS.md, "The map").
 * A room may always import itself. `packages` forbids npm packages and Node.js built-ins.
 */
const NOTHING_BOUND = [
  '^next($|/|-auth)',
  '^react($|/|-)',
  '^sequelize',
  '^mariadb',
  '^node:',
  '^(fs|path|crypto|os|http|net|util)$',
];
const rooms = {
  'lib/schemas': { may: ['lib/design', 'lib/policy'], packages: NOTHING_BOUND },
  'lib/design': { may: ['lib/schemas'], packages: NOTHING_BOUND },
  'lib/policy': { may: ['lib/schemas'], packages: NOTHING_BOUND },
  'lib/conduct': { may: ['lib/design', 'lib/schemas', 'lib/policy', 'lib/errors'], packages: NOTHING_BOUND },
  'lib/auth': { may: ['lib/schemas', 'lib/errors', 'lib/env'], packages: [] },
  'lib/db': {
    may: ['lib/env', 'lib/log', 'lib/errors', 'models', 'migrations'],
    packages: ['^next', '^react'],
  },
  'lib/commands': {
    may: [
      'models',
      'lib/db',
      'lib/conduct',
      'lib/design',
      'lib/policy',
      'lib/schemas',
      'lib/errors',
      'lib/env',
      'lib/log',
      'lib/auth',
      'lib/queries',
    ],
    packages: ['^next', '^react'],
  },
  'lib/queries': {
    may: [
      'models',
      'lib/db',
      'lib/conduct',
      'lib/design',
      'lib/policy',
      'lib/schemas',
      'lib/errors',
      'lib/env',
      'lib/log',
    ],
    packages: [],
  },
  'lib/server': {
    may: [
      'lib/commands',
      'lib/queries',
      'lib/auth',
      'lib/policy',
      'lib/schemas',
      'lib/errors',
      'lib/env',
      'lib/log',
      'lib/db',
    ],
    packages: [],
  },
  'lib/worker': {
    may: [
      'lib/commands',
      'lib/queries',
      'emails',
      'lib/design',
      'lib/schemas',
      'lib/errors',
      'lib/env',
      'lib/log',
      'lib/db',
      'models',
    ],
    packages: ['^next'],
  },
  models: { may: ['lib/schemas', 'lib/db'], packages: ['^next', '^react'] },
  migrations: { may: ['lib/schemas'], packages: ['^next', '^react'] },
  emails: { may: ['lib/schemas', 'components/caution', 'lib/design'], packages: ['^next'] },
  components: {
    may: ['lib/schemas', 'lib/policy', 'lib/design'],
    packages: ['^sequelize', '^mariadb', '^node:'],
  },
  app: {
    may: [
      'components',
      'lib/server',
      'lib/queries',
      'lib/schemas',
      'lib/policy',
      'lib/conduct',
      'lib/design',
      'lib/errors',
      'lib/env',
      'lib/log',
    ],
    packages: ['^sequelize', '^mariadb'],
  },
};
const everyRoom = [
  ...Object.keys(rooms),
  'lib/env',
  'lib/log',
  'lib/errors',
  'components/caution',
  'scripts',
  'tests',
];

function importPattern(room) {
  const inLib = room.startsWith('lib/');
  const name = inLib ? room.slice(4) : room;
  return inLib ? `(^@/lib/|^(\\.\\./)+(lib/)?)${name}($|/)` : `(^@/|^(\\.\\./)+)${name}($|/)`;
}

const roomRules = Object.entries(rooms).map(([room, { may, packages }]) => {
  const forbidden = everyRoom.filter(
    (other) =>
      other !== room &&
      !may.includes(other) &&
      !may.some((allowed) => allowed.startsWith(`${other}/`)) &&
      !may.some((allowed) => other.startsWith(`${allowed}/`)) &&
      !other.startsWith(`${room}/`),
  );
  return {
    files: [`${room}/**/*.{ts,tsx}`],
    ignores: ['**/*.test.ts', '**/*.test.tsx'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [
            ...forbidden.map((other) => ({
              regex: importPattern(other),
              message: `${room} may not import ${other} (see DEVELOPERS.md, the map of the house).`,
            })),
            ...packages.map((regex) => ({ regex, message: `${room} may not import this package.` })),
          ],
        },
      ],
    },
  };
});

const config = [
  { ignores: ['.next*/**', '.data/**', 'node_modules/**', 'public/**', 'next-env.d.ts', 'coverage/**'] },
  ...nextCoreWebVitals,
  ...nextTypescript,
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      '@typescript-eslint/consistent-type-imports': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-empty': ['error', { allowEmptyCatch: false }],
    },
  },
  {
    files: ['{app,components,emails,lib,models,migrations}/**/*.{ts,tsx}', 'proxy.ts'],
    ignores: ['lib/env.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        {
          object: 'process',
          property: 'env',
          message: 'Read the environment from lib/env.ts, which parses it once.',
        },
      ],
    },
  },
  ...roomRules,
];

export default config;
