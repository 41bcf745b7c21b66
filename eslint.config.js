import js from '@eslint/js'
import tseslint from 'typescript-eslint'
import reactHooks from 'eslint-plugin-react-hooks'

/** What each part of the tree may not import: scoring <- shared <- server, and src takes shared and scoring's front door. */
const forbid = (...patterns) => ({
  'no-restricted-imports': ['error', { patterns }],
})

export default tseslint.config(
  { ignores: ['dist', 'var', 'node_modules', 'scoring/rules/generated'] },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  {
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/ban-ts-comment': ['error', { minimumDescriptionLength: 1000 }],
      eqeqeq: 'error',
      'no-console': 'error',
    },
  },
  {
    files: ['scoring/**'],
    rules: {
      ...forbid({
        regex:
          '^(\\.\\./)+(shared|server|src)/|^(node:)?(fs|path|http|net|child_process|worker_threads)|^(express|typeorm|react)',
        message: 'scoring/ is pure: no I/O, nothing from shared/, server/ or src/.',
      }),
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'The random generator is an argument.' },
        { object: 'Date', property: 'now', message: 'No clock inside scoring/.' },
        { object: 'performance', property: 'now', message: 'No clock inside scoring/.' },
      ],
      'no-eval': 'error',
      'no-new-func': 'error',
    },
  },
  {
    files: ['scoring/cli.ts', 'scoring/cli/**', 'scoring/bench.ts', 'scoring/bench/**'],
    rules: { 'no-restricted-imports': 'off', 'no-restricted-properties': 'off' },
  },
  {
    files: ['scoring/certify/**'],
    rules: {
      // Everything outside the folder is the fast road or may lead to it, as scoring's front door does.
      ...forbid(
        {
          regex: '^(?!\\.\\./errors\\.ts$).*\\.\\./|^(/|file:|#|@/|scoring)',
          message: 'The independent road shares no code with the fast one; of ours it may import errors.ts.',
        },
        {
          regex: '^(node:)?(fs|path|http|net|child_process|worker_threads|module)|^(express|typeorm|react)',
          message: 'scoring/ is pure: no I/O.',
        },
      ),
      'no-restricted-syntax': [
        'error',
        { selector: 'ImportExpression', message: 'An import at run time would escape the rule on imports.' },
      ],
    },
  },
  {
    files: ['shared/**'],
    rules: forbid({ regex: '^(\\.\\./)+(server|src)/', message: 'shared/ may import scoring/ only.' }),
  },
  {
    files: ['server/**'],
    rules: forbid(
      { regex: '^(\\.\\./)+src/', message: 'server/ may not import the client.' },
      {
        regex: '^(\\.\\./)+scoring/(?!index\\.ts)',
        message: "Import scoring's front door, scoring/index.ts.",
      },
    ),
  },
  {
    files: ['src/**'],
    plugins: { 'react-hooks': reactHooks },
    rules: {
      ...reactHooks.configs.recommended.rules,
      // Speaks to the React compiler, which this build does not use.
      'react-hooks/incompatible-library': 'off',
      ...forbid(
        { regex: '^(\\.\\./)+server/', message: 'The client may not import the server.' },
        {
          regex: '^(\\.\\./)+scoring/(?!index\\.ts)',
          message: "Import scoring's front door, scoring/index.ts.",
        },
      ),
    },
  },
  { files: ['tests/setup/refuseNoise.ts'], rules: { 'no-console': 'off' } },
  {
    files: ['server/setup/**', '**/*.mjs', 'eslint.config.js'],
    languageOptions: { globals: { process: 'readonly', console: 'readonly', URL: 'readonly' } },
    rules: { 'no-console': 'off' },
  },
)
