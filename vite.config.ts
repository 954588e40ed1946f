import { fileURLToPath } from 'node:url';
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const at = (path: string) => fileURLToPath(new URL(path, import.meta.url));
const api = process.env.NIGHTCONE_API_URL ?? 'http://127.0.0.1:3000';

/** One configuration: the web build, its development server, and the test groups (`vitest run --project NAME`). */
export default defineConfig({
  root: at('apps/web'),
  plugins: [react(), tailwindcss()],
  server: {
    host: '127.0.0.1',
    strictPort: true,
    proxy: { '/api': { target: api, changeOrigin: false }, '/auth': { target: api, changeOrigin: false } },
  },
  // assetsInlineLimit 0: a small .wasm would become a data: URL, which connect-src 'self' does not cover
  build: { target: 'es2022', manifest: true, assetsInlineLimit: 0, outDir: 'dist', emptyOutDir: true },
  worker: { format: 'es' },
  test: {
    root: at('.'),
    projects: [
      {
        test: {
          name: 'unit',
          root: at('.'),
          environment: 'node',
          include: [
            'packages/{models,contracts,kernel,provenance,drawing}/**/*.test.ts',
            'apps/{worker,cli}/src/**/*.unit.test.ts',
            'tests/architecture/**/*.test.ts',
          ],
          exclude: ['**/node_modules/**'],
        },
      },
      {
        test: {
          name: 'database',
          root: at('.'),
          environment: 'node',
          include: [
            'packages/db/**/*.test.ts',
            'apps/{api,worker,cli}/src/**/*.test.ts',
            'tests/{faults,security,load}/**/*.test.ts',
          ],
          exclude: ['**/node_modules/**', '**/*.unit.test.ts'],
          globalSetup: ['packages/db/testing/server.ts'],
          pool: 'forks',
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'reference',
          root: at('.'),
          environment: 'node',
          include: ['tests/reference/**/*.test.ts'],
          testTimeout: 120_000,
        },
      },
      {
        plugins: [react()],
        test: {
          name: 'web',
          root: at('apps/web'),
          environment: 'jsdom',
          include: ['src/**/*.test.{ts,tsx}'],
          setupFiles: ['src/test-setup.ts'],
          css: false,
        },
      },
      {
        test: {
          name: 'e2e',
          root: at('.'),
          environment: 'node',
          include: ['tests/e2e/**/*.test.ts'],
          fileParallelism: false,
          testTimeout: 300_000,
          hookTimeout: 300_000,
        },
      },
    ],
  },
});
