import { defineConfig } from 'vitest/config';

/** Python sources are imported as text, as the bundler does. */
const pythonText = {
  name: 'python-as-text',
  enforce: 'pre' as const,
  transform(code: string, id: string) {
    return id.endsWith('.py') ? { code: `export default ${JSON.stringify(code)};`, map: null } : undefined;
  },
};

export default defineConfig({
  plugins: [pythonText],
  root: new URL('..', import.meta.url).pathname,
  test: { include: ['test/**/*.test.{ts,tsx}'], exclude: ['test/editor/**'], testTimeout: 60_000 },
});
