import { builtinModules } from 'node:module';
import js from '@eslint/js';
import nx from '@nx/eslint-plugin';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';
import { pageLayers } from './tools/lint/page-layers.mjs';

/**
 * Which of our projects may import which. A project that is not listed here fails lint as soon as it imports one of ours.
 * The table is explained in DEVELOPERS.md; tests/house plants a forbidden import of each kind and sees it refused.
 */
export const mayImport = {
  units: [],
  geometry: [],
  storage: [],
  config: [],
  logs: [],
  contracts: ['units'],
  mechanics: ['contracts', 'units'],
  jobs: ['contracts', 'units'],
  pictures: ['contracts', 'units'],
  client: ['contracts'],
  drizzle: ['contracts', 'config'],
  api: ['config', 'contracts', 'drizzle', 'jobs', 'logs', 'storage', 'mechanics', 'units'],
  worker: ['config', 'contracts', 'drizzle', 'jobs', 'logs', 'storage', 'mechanics', 'units', 'geometry', 'pictures'],
  // geometry only through its entry for a Web Worker, for what is shown before a measurement; see the rule for apps/web.
  web: ['client', 'contracts', 'geometry', 'mechanics', 'pictures', 'units'],
  cli: ['config', 'contracts', 'geometry', 'mechanics', 'units', 'client'],
};
/** Development only: these may import anything, and nothing but each other imports them. */
const freeToImport = ['demo', 'tests', 'bench', 'tools'];

const depConstraints = [
  ...Object.entries(mayImport).map(([project, allowed]) => ({
    sourceTag: `project:${project}`,
    onlyDependOnLibsWithTags: [`project:${project}`, ...allowed.map((name) => `project:${name}`)],
  })),
  ...freeToImport.map((project) => ({
    sourceTag: `project:${project}`,
    onlyDependOnLibsWithTags: [...Object.keys(mayImport), ...freeToImport].map((name) => `project:${name}`),
  })),
];

/** What is imported by a relative path from outside its project: the shared Vite settings by all, the services and meshes by tests. */
const boundaries = (...allow) => ['error', { allow: ['^.*/vite\\.shared\\.ts$', ...allow], depConstraints }];

const frameworks = ['react', 'react-dom', '@nestjs/*', 'three', '@react-three/*', 'drizzle-orm'];
const queueLibraries = ['bullmq', '@nestjs/bullmq', 'ioredis'];
const serverPackages = ['@nestjs/*', 'drizzle-orm', 'pg', '@aws-sdk/*', 'nodemailer', 'pino', 'pino-http', ...queueLibraries];
const escape = (name) => name.replaceAll(/[/.]/g, '\\$&').replace('*', '[^/]+');
/** Packages by name, with what lies below them. (A glob would match a folder of the same name in a relative path, too.) */
const forbid = (packages, message) => ({ regex: `^(?:${packages.map(escape).join('|')})(?:/|$)`, message });
const forbidNode = (message) => ({ regex: `^(?:node:|(?:${builtinModules.map(escape).join('|')})(?:/|$))`, message });
const restrict = (...patterns) => ['error', { patterns }];
const bundledIntoPages = [
  forbidNode('This is bundled into the pages: there is no Node API.'),
  forbid(serverPackages, 'This is bundled into the pages: there is no server package.'),
];

export default tseslint.config(
  // AssemblyScript looks like TypeScript and is none.
  { ignores: ['libs/geometry/assembly/**', '**/dist/**', '**/node_modules/**', '**/.nx/**', '**/.data/**', '**/.test/**', 'coverage/**', '**/*.generated.ts'] },
  js.configs.recommended,
  ...tseslint.configs.recommendedTypeChecked.map((config) => ({ ...config, files: ['**/*.{ts,tsx}'] })),
  {
    files: ['**/*.{ts,tsx}'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    plugins: { '@nx': nx },
    rules: {
      '@nx/enforce-module-boundaries': boundaries(),
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      eqeqeq: ['error', 'always'],
    },
  },
  {
    files: ['**/*.mjs'],
    languageOptions: { globals: { process: 'readonly', console: 'readonly', URL: 'readonly', fetch: 'readonly', setTimeout: 'readonly', clearTimeout: 'readonly', setInterval: 'readonly', clearInterval: 'readonly', performance: 'readonly', Buffer: 'readonly', AbortController: 'readonly', AbortSignal: 'readonly' } },
    rules: { 'no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }] },
  },
  {
    files: ['apps/web/public/**/*.js'],
    languageOptions: { sourceType: 'script', globals: { localStorage: 'readonly', matchMedia: 'readonly', document: 'readonly', window: 'readonly' } },
  },
  {
    files: [...freeToImport.map((project) => `${project}/**/*.{ts,tsx}`), 'libs/geometry/bench/**/*.ts'],
    rules: { '@nx/enforce-module-boundaries': boundaries('^(\\.\\./)+tools/[\\w./-]+$', '^(\\.\\./)+demo/src/.*$', '^(\\.\\./)+(tests/)?support/[\\w-]+$', '^(\\.\\./)+eslint\\.config\\.mjs$', '^(\\.\\./)+libs/client/src/openapi\\.json$') },
  },
  {
    // They run in a browser, in a worker thread and on a server alike.
    files: ['libs/{units,geometry,mechanics}/src/**/*.ts'],
    ignores: ['**/*.spec.ts', '**/testing/**'],
    rules: {
      'no-restricted-imports': restrict(
        forbidNode('units, geometry and mechanics use no Node API: they run in a browser too.'),
        forbid(frameworks, 'units, geometry and mechanics use no framework.'),
      ),
      'no-restricted-globals': ['error', 'process', 'Buffer', 'require', '__dirname'],
    },
  },
  {
    // No rounding that differs between engines may reach a recorded bit.
    files: ['libs/{geometry,mechanics}/src/**/*.ts'],
    ignores: ['**/*.spec.ts', '**/testing/**'],
    rules: {
      'no-restricted-syntax': ['error', { selector: "BinaryExpression[operator='**'], AssignmentExpression[operator='**=']", message: 'It is Math.pow, which engines may round differently; multiply instead.' }],
      'no-restricted-properties': ['error', ...['hypot', 'pow', 'sin', 'cos', 'tan', 'asin', 'acos', 'atan', 'atan2', 'exp', 'log', 'cbrt', 'sinh', 'cosh', 'tanh'].map((property) => ({ object: 'Math', property, message: 'Engines may round it differently; only + - * / and Math.sqrt are exact to the last bit.' }))],
    },
  },
  {
    files: ['apps/api/**/*.ts'],
    rules: {
      'no-restricted-imports': restrict(
        forbid(queueLibraries, 'The api never touches the queue: it writes to the outbox, the worker relays.'),
        forbid(['@masswright/geometry'], 'The api never touches a mesh: the worker measures.'),
      ),
    },
  },
  {
    // They are bundled into the pages.
    files: ['libs/{contracts,client,pictures}/src/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { 'no-restricted-imports': restrict(...bundledIntoPages) },
  },
  {
    files: ['apps/web/src/**/*.{ts,tsx}'],
    ignores: ['**/*.spec.{ts,tsx}'],
    rules: {
      'no-restricted-imports': restrict(...bundledIntoPages, {
        regex: '^@masswright/geometry(?!/web-worker$)(?:/|$)',
        message: 'The pages measure nothing: what is shown before a measurement comes from @masswright/geometry/web-worker.',
      }),
    },
  },
  {
    files: ['apps/web/**/*.{ts,tsx}'],
    ...reactHooks.configs.flat['recommended-latest'],
  },
  {
    files: ['apps/web/src/**/*.{ts,tsx}'],
    plugins: { house: { rules: { 'page-layers': pageLayers } } },
    rules: { 'house/page-layers': 'error' },
  },
);
