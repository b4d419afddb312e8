import expo from 'eslint-config-expo/flat.js';
import prettier from 'eslint-config-prettier';
import { defineConfig, globalIgnores } from 'eslint/config';
import { configs } from 'typescript-eslint';

/** Imports run one way: app → components → shared → strategy; server → db → shared → strategy. */
const floors = {
  strategy: ['app', 'components', 'server', 'db', 'shared', 'tests'],
  shared: ['app', 'components', 'server', 'db', 'tests'],
  db: ['app', 'components', 'server', 'tests'],
  components: ['app', 'server', 'db', 'tests'],
  app: ['server', 'db', 'tests'],
  server: ['app', 'components', 'tests'],
};
const fence = (floor, above, inPage) => ({
  'no-restricted-imports': [
    'error',
    {
      patterns: [
        {
          regex: `^(@/|(\\.\\./)+)(${above.join('|')})/`,
          message: `${floor}/ may not import from ${above.join(', ')}: imports run one way.`,
        },
        ...(floor === 'strategy'
          ? [{ regex: '^(node:|react|expo|express|drizzle|pg$|zod)', message: 'strategy/ is pure: no platform.' }]
          : []),
        ...(floor === 'shared'
          ? [{ regex: '^(node:|react|expo|express|drizzle|pg$)', message: 'shared/ runs on both sides.' }]
          : []),
        ...(floor === 'components' || floor === 'app'
          ? [{ regex: '^mathjs', message: 'mathjs lives in strategy/rules/ and is built into a worker.' }]
          : []),
        ...(inPage
          ? [
              {
                regex: 'strategy/rules/(index|rule|understand)\\.ts$',
                message: 'This brings mathjs into the first bundle. The names alone are in strategy/rules/names.ts.',
              },
            ]
          : []),
      ],
    },
  ],
});
const oneWay = Object.entries(floors).flatMap(([floor, above]) => [
  { files: [`${floor}/**/*.{ts,tsx}`], rules: fence(floor, above, ['components', 'app', 'shared'].includes(floor)) },
  { files: [`${floor}/**/*.worker.ts`], rules: fence(floor, above, false) },
]);

const node = {
  process: 'readonly',
  console: 'readonly',
  Buffer: 'readonly',
  setTimeout: 'readonly',
  clearTimeout: 'readonly',
  setInterval: 'readonly',
  clearInterval: 'readonly',
  URL: 'readonly',
  fetch: 'readonly',
  AbortSignal: 'readonly',
  __dirname: 'readonly',
  require: 'readonly',
  module: 'writable',
};

export default defineConfig([
  globalIgnores([
    'dist*/**',
    'build/**',
    'coverage/**',
    'public/**',
    '.expo/**',
    '.house/**',
    '.look/**',
    'expo-env.d.ts',
    'db/migrations/**',
  ]),
  expo,
  {
    files: ['**/*.{ts,tsx,mts}'],
    extends: [configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-redeclare': 'off', // zod: a schema and its type share a name
      '@typescript-eslint/require-await': 'off',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }], // onPress={handleSubmit(…)}
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  ...oneWay,
  {
    // Raw text and inputs exist in ui/ only, so that every label has the theme's type and every field a name.
    files: ['components/**/*.tsx', 'app/**/*.tsx'],
    ignores: ['components/ui/**'],
    rules: {
      '@typescript-eslint/no-restricted-imports': [
        'error',
        {
          paths: [
            {
              name: 'react-native',
              importNames: ['Text', 'TextInput', 'Button', 'TouchableOpacity'],
              message: 'Use the controls of components/ui.',
            },
          ],
        },
      ],
    },
  },
  {
    // Screens are made of React Native's parts. What only the browser has (a form, a select, a dialog) stands in *.web.tsx.
    files: ['components/**/*.tsx', 'app/**/*.tsx'],
    ignores: ['**/*.web.tsx', 'app/+html.tsx'],
    rules: {
      'no-restricted-syntax': [
        'error',
        {
          selector: 'JSXOpeningElement > JSXIdentifier[name=/^(?!title$)[a-z]/]', // a page's title stands in its head
          message: 'Use View, Text, Pressable, react-native-svg or a control of components/ui.',
        },
      ],
    },
  },
  {
    files: ['server/**', 'tests/**', 'db/**', '**/*.cjs', '**/*.mjs', '*.config.*'],
    languageOptions: { globals: node },
  },
  prettier,
]);
