import tseslint from 'typescript-eslint';

// Layers are guarded three ways (types per folder, bundle externals, these rules); each alone lets something through.
const layer = (files, group, message) => ({
  files,
  rules: {
    'no-restricted-imports': ['error', { patterns: [{ group, message }] }],
    'no-restricted-syntax': [
      'error',
      { selector: 'ImportExpression[source.value=/^(vscode|node:)/]', message },
      { selector: 'TSImportType[argument.literal.value=/^(vscode|node:)/]', message },
    ],
  },
});

export default tseslint.config(
  {
    ignores: [
      'dist/**',
      '.tsbuild/**',
      '.e2e/**',
      'build-output/**',
      'demo/**',
      '**/*.mjs',
      '**/*.cjs',
      '**/*.d.mts',
      'src/wasm/**',
      '.config/**',
    ],
  },
  ...tseslint.configs.strictTypeChecked,
  {
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: process.cwd() } },
    rules: {
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unnecessary-condition': ['error', { allowConstantLoopConditions: true }],
      '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
    },
  },
  layer(
    ['src/core/**'],
    ['vscode', 'node:*', '**/host/**', '**/extension/**', '**/webview/**'],
    'src/core runs anywhere: no vscode, no Node, no DOM.',
  ),
  layer(
    ['src/host/**'],
    ['vscode', '**/extension/**', '**/webview/**'],
    'src/host runs headless: no vscode.',
  ),
  layer(
    ['webview/**'],
    [
      'vscode',
      'node:*',
      '**/host/**',
      '**/extension/**',
      '**/core/steps/**',
      '**/core/kernels/**',
      '**/core/formats/**',
      '**/core/recipe/**',
    ],
    'The page gets step descriptions and results as data over the protocol.',
  ),
);
