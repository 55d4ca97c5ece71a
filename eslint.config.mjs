import eslint from '@eslint/js';
import angular from 'angular-eslint';
import prettier from 'eslint-config-prettier';
import importX, {createNodeResolver} from 'eslint-plugin-import-x';
import {defineConfig} from 'eslint/config';
import tseslint from 'typescript-eslint';

// Who may import whom (DEVELOPERS.md, "The map"). A pattern here is what a folder must NOT reach.
const outOf = (folders, message) => ({
  // A pattern that begins with a bare # would be a comment and hold nothing back.
  group: folders.flatMap((folder) => [`\\#${folder}/**`, `**/${folder}/**`]),
  message,
});
const onlyTheDoor = {
  regex: '^#sim-core/(?!index$|analysis/index$)',
  message: 'Only the doors of sim-core: #sim-core/index and #sim-core/analysis/index.',
};
const anyPackage = {
  regex: '^(?![.#])',
  message: 'No packages here.',
};
const restrict = (...patterns) => ({
  '@typescript-eslint/no-restricted-imports': ['error', {patterns}],
});

/** Math functions that give the same bits in every engine (measured: the others do not). */
const EXACT_MATH = ['sqrt', 'abs', 'min', 'max', 'floor', 'round', 'sign', 'imul'];
const inexactMath = {
  selector: `MemberExpression[object.name='Math']:not([property.name=/^(${EXACT_MATH.join('|')})$/])`,
  message: `Only ${EXACT_MATH.map((name) => `Math.${name}`).join(', ')}: others differ between browsers.`,
};
const engineBans = [
  inexactMath,
  {selector: "MemberExpression[object.name='Math'][computed=true]", message: 'Name the function.'},
  {
    selector: "VariableDeclarator[init.name='Math'], AssignmentExpression[right.name='Math']",
    message: 'Math must not travel under another name: the ban list would not see it.',
  },
  {selector: "BinaryExpression[operator='**']", message: '** gives different bits; multiply.'},
  {selector: "AssignmentExpression[operator='**=']", message: '** gives different bits; multiply.'},
  {selector: 'AwaitExpression', message: 'The engine never waits.'},
];
const noEnum = {
  selector: 'TSEnumDeclaration',
  message: 'A z.enum in shared, a string union elsewhere.',
};

export default defineConfig(
  {
    ignores: [
      'dist/',
      'node_modules/',
      '.angular/',
      '.pg/',
      '.run/',
      'coverage/',
      'test-results/',
      'playwright-report/',
    ],
  },
  {linterOptions: {reportUnusedDisableDirectives: 'error'}},
  {
    files: ['**/*.ts'],
    extends: [
      eslint.configs.recommended,
      tseslint.configs.strictTypeChecked,
      importX.flatConfigs.typescript,
      prettier,
    ],
    languageOptions: {
      parserOptions: {
        project: [
          'tsconfig.json',
          'tsconfig.spec.json',
          'tsconfig.app.json',
          'tsconfig.worker.json',
          '{sim-core,shared}/tsconfig.spec.json',
        ],
        tsconfigRootDir: import.meta.dirname,
      },
    },
    plugins: {'import-x': importX},
    settings: {
      'import-x/resolver-next': [createNodeResolver({extensions: ['.ts', '.mjs', '.js', '.json']})],
    },
    rules: {
      'import-x/no-cycle': ['error', {ignoreExternal: true}],
      'import-x/no-default-export': 'error',
      'no-restricted-syntax': ['error', noEnum],
      'no-console': 'error',
      '@typescript-eslint/no-non-null-assertion': 'off', // typed arrays under noUncheckedIndexedAccess
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        {allowNumber: true, allowBoolean: true},
      ],
      '@typescript-eslint/consistent-type-imports': ['error', {fixStyle: 'inline-type-imports'}],
      '@typescript-eslint/no-unsafe-class-instance-assignment': 'off', // Material takes its option objects as literals
      '@typescript-eslint/no-extraneous-class': ['error', {allowWithDecorator: true}],
      '@typescript-eslint/no-confusing-void-expression': ['error', {ignoreArrowShorthand: true}],
      '@typescript-eslint/no-unnecessary-condition': [
        'error',
        {allowConstantLoopConditions: 'only-allowed-literals'},
      ],
    },
  },
  {
    files: ['sim-core/**/*.ts'],
    ignores: ['sim-core/analysis/**', 'sim-core/**/*.spec.ts', 'sim-core/test-support/**'],
    rules: {
      ...restrict(
        anyPackage,
        outOf(['shared', 'server', 'src', 'test', 'analysis'], 'The engine imports only itself.'),
      ),
      'no-restricted-syntax': ['error', noEnum, ...engineBans],
      'no-restricted-globals': [
        'error',
        'Date',
        'performance',
        'crypto',
        'Intl',
        'setTimeout',
        'globalThis',
      ],
      'no-restricted-properties': ['error', {object: 'Math', property: 'random'}],
    },
  },
  {
    // control and plant are joined by run/ alone.
    files: ['sim-core/plant/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: restrict(
      anyPackage,
      outOf(
        ['shared', 'server', 'src', 'test', 'analysis', 'control', 'run', 'scoring', 'measures'],
        'plant/ stands alone.',
      ),
    ),
  },
  {
    files: ['sim-core/control/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: restrict(
      anyPackage,
      outOf(
        ['shared', 'server', 'src', 'test', 'analysis', 'plant', 'run', 'scoring', 'measures'],
        'control/ stands alone.',
      ),
    ),
  },
  {
    files: ['shared/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: {
      '@typescript-eslint/no-restricted-imports': [
        'error',
        {
          patterns: [
            {...outOf(['server', 'src', 'test'], 'shared imports types of sim-core and itself.')},
            {regex: '^(?![.#]|zod$)', message: 'zod is the only package in shared.'},
            {
              regex: '^#sim-core/(?!scenario/fields$)',
              allowTypeImports: true,
              message: 'Types only, or scenario/fields.',
            },
          ],
        },
      ],
    },
  },
  {
    files: ['server/**/*.ts'],
    rules: restrict(onlyTheDoor, outOf(['src', 'test'], 'The server never imports the client.')),
  },
  {
    files: ['server/**/*.ts'],
    ignores: ['server/**/*-service.ts', 'server/**/*.spec.ts', 'server/test-support/**'],
    rules: {
      'no-restricted-syntax': [
        'error',
        noEnum,
        {
          selector: "CallExpression[callee.property.name='getRepository']",
          message: 'Rows are read in a -service.ts, which takes a Caller.',
        },
      ],
    },
  },
  {
    files: ['server/**/*.ts'],
    ignores: ['server/config.ts', 'server/**/*.spec.ts', 'server/test-support/**'],
    rules: {
      'no-restricted-properties': [
        'error',
        {object: 'process', property: 'env', message: 'Only config.ts reads the environment.'},
      ],
    },
  },
  {
    files: ['src/**/*.ts'],
    extends: [angular.configs.tsRecommended],
    processor: angular.processInlineTemplates,
    rules: {
      ...restrict(onlyTheDoor, outOf(['server', 'test'], 'The client never imports the server.')),
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@typescript-eslint/no-unsafe-enum-assignment': 'off', // uPlot's enums exist as types only
    },
  },
  {
    // Features import ui, platform and live-run, never each other; those three import no feature.
    files: ['src/app/{live-run,ui,platform}/**/*.ts'],
    rules: restrict(
      onlyTheDoor,
      outOf(['server', 'test'], 'The client never imports the server.'),
      {
        // By relative paths alone: shared has folders of the same names.
        regex: '^\\..*/(account|attempts|bench|exercises|today)/',
        message: 'ui, platform and live-run import no feature.',
      },
    ),
  },
  {
    files: ['src/**/*.html'],
    extends: [angular.configs.templateRecommended, angular.configs.templateAccessibility],
  },
  {
    files: ['test/**/*.ts'],
    rules: restrict(onlyTheDoor, {
      regex: '(^|/)server/(?!app$|test-support/)',
      message: 'Tests across folders start server/app.ts only.',
    }),
  },
  {
    files: ['**/*.spec.ts', 'test/**/*.ts', '**/test-support/**/*.ts'],
    rules: {
      'no-restricted-globals': ['error', 'fdescribe', 'fit', 'xdescribe', 'xit'],
      '@typescript-eslint/no-unsafe-assignment': 'off', // bodies of replies are any until parsed
      '@typescript-eslint/no-unsafe-member-access': 'off',
    },
  },
  {
    files: ['tools/**/*.ts', 'test/**/*.ts', 'server/main.ts', 'server/worker.ts'],
    rules: {'no-console': 'off'},
  },
  {
    // The runner's own forms: what it loads is the default export, a fixture without others takes {}.
    files: ['test/e2e/playwright.config.ts', 'test/e2e/support/*.ts'],
    rules: {'import-x/no-default-export': 'off', 'no-empty-pattern': 'off'},
  },
  {
    files: ['tools/**/*.mjs', '*.mjs', '*.cjs'],
    extends: [eslint.configs.recommended, prettier],
    languageOptions: {
      globals: {
        process: 'readonly',
        console: 'readonly',
        setTimeout: 'readonly',
        clearTimeout: 'readonly',
        setInterval: 'readonly',
        clearInterval: 'readonly',
        fetch: 'readonly',
        URL: 'readonly',
        Buffer: 'readonly',
        require: 'readonly',
        module: 'writable',
        AbortSignal: 'readonly',
        document: 'readonly',
        window: 'readonly',
      },
    },
  },
);
