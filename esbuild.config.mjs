import { build } from 'esbuild';
import { cpSync, existsSync, mkdirSync, readdirSync } from 'node:fs';
import { buildWasm } from './scripts/build-wasm.mjs';

/** All bundles, one per runtime; `vscode` is external in the extension alone, so a leak elsewhere fails the build. */
const base = {
  bundle: true,
  outdir: 'dist',
  logLevel: 'warning',
  legalComments: 'linked',
  // jsonc-parser's CommonJS entry hides its requires from bundlers; its module entry does not.
  mainFields: ['module', 'main'],
  minifySyntax: true,
  loader: { '.py': 'text' },
};
const page = {
  ...base,
  platform: 'browser',
  format: 'iife',
  target: 'es2022',
  minify: true,
  jsx: 'automatic',
  jsxImportSource: 'preact',
};
mkdirSync('dist', { recursive: true });
const pages = existsSync('webview')
  ? readdirSync('webview').filter((f) => /^(look|data)\.tsx$|^(plotly|report)\.(ts|css)$/.test(f))
  : [];
await Promise.all([
  buildWasm(),
  existsSync('src/extension/extension.ts') &&
    build({
      ...base,
      entryPoints: { extension: 'src/extension/extension.ts' },
      platform: 'node',
      format: 'cjs',
      target: 'node20',
      outExtension: { '.js': '.cjs' },
      external: ['vscode'],
    }),
  build({
    ...base,
    entryPoints: { worker: 'src/host/worker.ts', cli: 'src/host/cli/main.ts' },
    platform: 'node',
    format: 'esm',
    target: 'node20',
    outExtension: { '.js': '.mjs' },
    // Bundled CommonJS packages ask for `require`, which an ES module does not have.
    banner: {
      js: "import { createRequire as __createRequire } from 'node:module'; const require = __createRequire(import.meta.url);",
    },
  }),
  pages.length > 0 &&
    build({
      ...page,
      entryPoints: pages.map((f) => `webview/${f}`),
    }),
]);
// The stand-alone report needs the whole figure library, unbundled, to put it inside the page.
cpSync('node_modules/plotly.js-dist-min/plotly.min.js', 'dist/report-plotly.min.js');
