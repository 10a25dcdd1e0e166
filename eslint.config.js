import tseslint from 'typescript-eslint';
import officeAddins from 'eslint-plugin-office-addins';

export default tseslint.config(
  { ignores: ['dist/', 'dist-cli/', 'test/output/', '.cache/'] },
  ...tseslint.configs.recommended,
  {
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
    },
  },
  {
    // The host's own objects are used in the spreadsheet host alone; everything else asks through host/port.ts.
    files: ['src/host/office/**/*.ts', 'src/main-office.ts'],
    plugins: { 'office-addins': officeAddins },
    rules: {
      'office-addins/call-sync-after-load': 'error',
      'office-addins/call-sync-before-read': 'error',
      'office-addins/load-object-before-read': 'error',
      'office-addins/no-context-sync-in-loop': 'error',
      'office-addins/no-empty-load': 'error',
      'office-addins/no-navigational-load': 'error',
      'office-addins/no-office-initialize': 'error',
      'office-addins/test-for-null-using-isNullObject': 'error',
    },
  },
  {
    files: ['src/**/*.ts'],
    ignores: ['src/host/office/**', 'src/main-office.ts'],
    rules: {
      'no-restricted-globals': ['error', ...['Office', 'Excel'].map((name) => ({ name, message: 'Ask through host/port.ts.' }))],
    },
  },
  {
    // A worksheet function takes cells of any kind: that is what the host's metadata calls any[][].
    files: ['src/functions/**/*.ts'],
    rules: { '@typescript-eslint/no-explicit-any': 'off' },
  },
);
