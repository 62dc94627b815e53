import next from 'eslint-config-next/core-web-vitals';
import tseslint from 'typescript-eslint';

/** Typed rules matter most here: a promise that floats out of a transaction is a lost write. */
const rules = [
  { ignores: ['.next/**', '.data/**', 'node_modules/**', 'next-env.d.ts', 'tests/reference/**'] },
  ...next,
  {
    files: ['**/*.ts', '**/*.tsx'],
    plugins: { '@typescript-eslint': tseslint.plugin },
    languageOptions: { parser: tseslint.parser, parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      'no-console': 'error',
      'max-lines': ['error', { max: 350, skipBlankLines: true, skipComments: true }],
    },
  },
  { files: ['stats/registry.ts'], rules: { 'max-lines': 'off' } },
  { files: ['scripts/**', 'tests/**'], rules: { 'no-console': 'off', 'max-lines': 'off' } },
];

export default rules;
