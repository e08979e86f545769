import jsxA11y from 'eslint-plugin-jsx-a11y';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

/** Functions whose last digit differs between machines; numeric/portable-math.ts has our own. */
const unportableMath = [
  'exp expm1 log log10 log1p log2 pow sin cos tan asin acos atan atan2',
  'sinh cosh tanh asinh acosh atanh cbrt hypot',
]
  .join(' ')
  .split(' ')
  .map((property) => ({
    object: 'Math',
    property,
    message: 'Its last digit differs between machines: use numeric/portable-math.ts.',
  }));

const power = {
  selector: ":matches(BinaryExpression[operator='**'], AssignmentExpression[operator='**='])",
  message: 'Its last digit differs between machines: multiply, or use pow of numeric/portable-math.ts.',
};
const mathTakenApart = {
  selector: "VariableDeclarator[init.name='Math']",
  message: 'Call Math functions by their full name, so that the ban on the unportable ones can see them.',
};
const defaultExport = {
  selector: 'ExportDefaultDeclaration',
  message: 'Use named exports: one name for one thing everywhere.',
};
const classes = { selector: 'ClassDeclaration', message: 'shared-core is data and functions.' };
const dynamicImport = {
  selector: 'ImportExpression',
  message: 'The layer test reads static imports only.',
};
const localeMethods = {
  selector: 'CallExpression[callee.property.name=/^(toLocale|localeCompare)/]',
  message: "The answer depends on the machine's language.",
};

export default tseslint.config(
  { ignores: ['node_modules', 'out', 'release', 'coverage', 'test-results', 'assets'] },
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  {
    files: ['**/*.ts', '**/*.tsx'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      'no-restricted-syntax': ['error', defaultExport],
      'no-console': 'error',
      eqeqeq: 'error',
    },
  },
  {
    files: ['shared-core/**/*.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        ...unportableMath,
        { object: 'Math', property: 'random', message: 'Take a seed: numeric/random.ts.' },
      ],
      'no-restricted-globals': [
        'error',
        { name: 'Date', message: 'shared-core has no clock: take the time as an argument.' },
        { name: 'Intl', message: "The answer depends on the machine's language." },
      ],
      'no-restricted-syntax': [
        'error',
        defaultExport,
        power,
        mathTakenApart,
        classes,
        dynamicImport,
        localeMethods,
      ],
    },
  },
  {
    files: ['shared-core/**/*.ts', 'electron/**/*.ts', 'renderer/**/*.{ts,tsx}'],
    rules: { 'max-lines': ['error', { max: 300, skipBlankLines: true, skipComments: true }] },
  },
  {
    files: ['electron/services/**/*.ts', 'electron/loopback/**/*.ts', 'electron/command-line/**/*.ts'],
    rules: {
      '@typescript-eslint/no-restricted-imports': [
        'error',
        { paths: [{ name: 'electron', message: 'Only electron/desktop runs inside Electron.' }] },
      ],
    },
  },
  { files: ['test/**/*.{ts,tsx}'], rules: { 'no-console': 'off' } },
  {
    files: ['renderer/**/*.{ts,tsx}'],
    extends: [reactHooks.configs.flat.recommended, jsxA11y.flatConfigs.recommended],
  },
  {
    files: ['**/*.mjs', '**/*.js'],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        URL: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
      },
    },
    rules: { 'no-undef': 'error', 'no-unused-vars': 'error', eqeqeq: 'error' },
  },
);
