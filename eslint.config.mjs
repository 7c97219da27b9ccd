import next from 'eslint-config-next/core-web-vitals';
import tseslint from 'typescript-eslint';

const onlyEnv = {
  selector: "MemberExpression[object.name='process'][property.name='env']",
  message: 'Read configuration through lib/env, which names what is missing.',
};
const dangerousHtml = {
  selector: "JSXAttribute[name.name='dangerouslySetInnerHTML']",
  message: 'Render rich text through lib/editor, never as raw HTML.',
};

const config = [
  {
    ignores: ['**/node_modules/**', '.next*/**', '.data*/**', 'next-env.d.ts', 'tests/.out/**', 'drizzle/**'],
  },
  ...next,
  ...tseslint.configs.recommended,
  {
    rules: {
      'no-restricted-syntax': ['error', onlyEnv, dangerousHtml],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      'max-lines': ['error', { max: 400, skipBlankLines: true, skipComments: true }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
    },
  },
  {
    files: ['lib/env/**', 'docker/**', 'tests/**', '*.config.*'],
    rules: { 'no-restricted-syntax': ['error', dangerousHtml] },
  },
  {
    files: ['tests/**'],
    rules: {
      'no-restricted-properties': [
        'error',
        ...['it', 'test', 'describe'].flatMap((object) =>
          ['only', 'skip', 'todo'].map((property) => ({
            object,
            property,
            message: 'Every committed test runs.',
          })),
        ),
      ],
    },
  },
];

export default config;
