const { defineConfig, globalIgnores } = require('eslint/config');
const globals = require('globals');
const expo = require('eslint-config-expo/flat');

/** Drawn by components/ui alone, where type sizes, target sizes and focus are settled once. */
const onlyInUi = [
  'Text',
  'TextInput',
  'Pressable',
  'Modal',
  'Button',
  'TouchableOpacity',
  'TouchableHighlight',
];
const restrictedPaths = [
  { name: 'react-native', importNames: ['Alert', 'RefreshControl'], message: 'Does nothing on the web.' },
  { name: '@expo/vector-icons', message: 'Deprecated; draw with react-native-svg.' },
];

module.exports = defineConfig([
  globalIgnores(['node_modules', 'dist', '.expo', '.data', 'artifacts', 'drizzle', 'public', '**/*.gen.ts']),
  expo,
  {
    linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' },
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-console': 'error',
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx', 'hack'], location: 'anywhere' }],
      'prefer-const': 'error',
      'no-restricted-imports': ['error', { paths: restrictedPaths, patterns: ['@react-navigation/*'] }],
    },
  },
  {
    files: ['**/*.ts', '**/*.tsx'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/ban-ts-comment': 'error',
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      // a schema and its type share one name: export const Reading = …; export type Reading = z.infer<typeof Reading>
      '@typescript-eslint/no-redeclare': 'off',
    },
  },
  {
    files: ['app/**', 'components/**', 'stores/**'],
    ignores: ['components/ui/**'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          paths: [
            ...restrictedPaths,
            { name: 'react-native', importNames: onlyInUi, message: 'Use the one in components/ui.' },
          ],
          patterns: ['@react-navigation/*'],
        },
      ],
    },
  },
  {
    // no React here: a function called "use" is no hook
    files: ['shared/**', 'db/**', 'server/**'],
    rules: { 'react-hooks/rules-of-hooks': 'off' },
  },
  {
    files: ['shared/**'],
    rules: {
      'no-restricted-globals': ['error', 'process', 'window', 'document', 'localStorage', 'fetch'],
    },
  },
  {
    // programs that speak to a person at a terminal
    files: ['server/bin/**', 'tests/bench/**', 'tests/**/*.mjs'],
    languageOptions: { globals: globals.node },
    rules: { 'no-console': 'off' },
  },
  {
    files: ['*.js', '*.cjs', 'tests/**/*.cjs'],
    languageOptions: { globals: globals.node, sourceType: 'commonjs' },
    rules: { '@typescript-eslint/no-require-imports': 'off' },
  },
  {
    files: ['tests/**'],
    languageOptions: { globals: { ...globals.node, ...globals.jest } },
    rules: {
      'import/no-named-as-default-member': 'off',
      '@typescript-eslint/no-require-imports': 'off',
      // a test may insist: an exception there is a failure with a line number
      '@typescript-eslint/no-non-null-assertion': 'off',
      'no-restricted-syntax': [
        'error',
        {
          selector:
            'MemberExpression[object.name=/^(test|it|describe)$/][property.name=/^(skip|only|todo)$/]',
          message: 'Every test runs, always.',
        },
      ],
    },
  },
]);
