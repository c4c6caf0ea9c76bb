import js from '@eslint/js'
import tseslint from 'typescript-eslint'

/** `model/` is pure: no file, clock, environment or global randomness can reach a figure. */
const pureModel = {
  files: ['model/**/*.ts'],
  rules: {
    'no-restricted-globals': ['error', 'Date', 'process', 'performance', 'fetch', 'console', 'setTimeout', 'Buffer'],
    'no-restricted-properties': ['error', { object: 'Math', property: 'random', message: 'Randomness comes from the seeded generator that is passed in.' }],
    'no-restricted-imports': ['error', { patterns: [{ group: ['node:*', '**/generator/**'], message: 'model/ imports neither node:* nor generator/.' }] }],
  },
}

export default tseslint.config(
  { ignores: ['dist/**', 'node_modules/**', 'demo/**', 'coverage/**', '**/*.cjs', '**/drafts/**'] },
  js.configs.recommended,
  ...tseslint.configs.strict,
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      'no-undef': 'off',
    },
  },
  pureModel,
)
