import coreWebVitals from 'eslint-config-next/core-web-vitals';
import typescript from 'eslint-config-next/typescript';

/** A test that is left out or alone would go unnoticed. */
const leftOut = ['it', 'test', 'describe'].flatMap((name) =>
  ['skip', 'only', 'todo', 'fixme'].map((property) => ({
    selector: `MemberExpression[object.name='${name}'][property.name='${property}']`,
    message: `No ${name}.${property}: every test that is there runs.`,
  })),
);

const config = [
  { ignores: ['.next/**', '.data/**', 'node_modules/**', 'next-env.d.ts', 'db/migrations/**'] },
  ...coreWebVitals,
  ...typescript,
  {
    // A rule holds everywhere: comments that switch it off have no effect.
    linterOptions: { noInlineConfig: true },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      '@typescript-eslint/ban-ts-comment': ['error', { 'ts-expect-error': 'allow-with-description' }],
      eqeqeq: 'error',
      'max-lines': ['error', 320],
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx', 'hack'] }],
    },
  },
  {
    files: ['app/**', 'components/**', 'db/**', 'lib/**', 'worker/**', 'scripts/**'],
    rules: { 'no-console': 'error' },
  },
  {
    // There is no React here; a function that is called “use” is no hook.
    files: ['db/**', 'lib/**', 'worker/**', 'scripts/**', 'tests/**'],
    rules: { 'react-hooks/rules-of-hooks': 'off' },
  },
  { files: ['tests/**'], rules: { 'no-restricted-syntax': ['error', ...leftOut] } },
];

export default config;
