import tseslint from 'typescript-eslint';
import reactHooks from 'eslint-plugin-react-hooks';

const noClockOrDice = [
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'The core takes time as an argument.',
  },
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'The core takes time as an argument.',
  },
  {
    selector:
      "CallExpression[callee.object.name='DateTime'][callee.property.name=/^(now|local|utc)$/]",
    message: 'The core takes time as an argument.',
  },
  {
    selector: "CallExpression[callee.object.name='performance'][callee.property.name='now']",
    message: 'The core takes time as an argument.',
  },
  {
    selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
    message: 'The core takes randomness as an argument.',
  },
];

export default tseslint.config(
  { ignores: ['node_modules/**', 'dist/**', 'drizzle/**', '.millpond/**'] },
  {
    files: ['{src,server,worker,shared,fakes,tests}/**/*.{ts,tsx}'],
    extends: [tseslint.configs.strictTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: process.cwd() },
    },
    rules: {
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/consistent-type-assertions': ['error', { assertionStyle: 'never' }],
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      'max-lines': ['error', { max: 400, skipBlankLines: true, skipComments: true }],
      complexity: ['error', 12],
      'no-console': 'error',
      curly: 'error',
      eqeqeq: 'error',
    },
  },
  {
    files: ['src/**/*.{ts,tsx}'],
    plugins: { 'react-hooks': reactHooks },
    rules: {
      'react-hooks/rules-of-hooks': 'error',
      'react-hooks/exhaustive-deps': 'error',
      // React 19 accepts async event handlers; rejections reach the query client's handler.
      '@typescript-eslint/no-misused-promises': [
        'error',
        { checksVoidReturn: { attributes: false } },
      ],
    },
  },
  {
    files: ['tests/**/*.{ts,tsx}'],
    rules: { 'max-lines': ['error', { max: 600, skipBlankLines: true, skipComments: true }] },
  },
  {
    files: ['shared/domain/**/*.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        'process',
        'fetch',
        'setTimeout',
        'setInterval',
        'console',
      ],
      'no-restricted-syntax': ['error', ...noClockOrDice],
    },
  },
  {
    files: ['{server,worker,fakes}/**/*.ts'],
    ignores: ['**/config.ts'],
    rules: {
      'no-restricted-syntax': [
        'error',
        {
          selector: "MemberExpression[object.name='process'][property.name='env']",
          message: 'Read settings through config.ts.',
        },
      ],
    },
  },
);
