import { defineConfig } from 'vitest/config';

export default defineConfig({
  base: './',
  // MapLibre imports worker scripts named .mjs as modules; any other name it would evaluate as text, which the
  // content security policy forbids.
  worker: { format: 'es', rolldownOptions: { output: { entryFileNames: 'assets/[name]-[hash].mjs' } } },
  build: {
    target: 'es2022',
    modulePreload: { polyfill: false },
    assetsInlineLimit: 0,
    chunkSizeWarningLimit: 1500,
    license: { fileName: 'licences.md' },
  },
  test: {
    projects: [
      { test: { name: 'unit', include: ['src/**/*.test.ts'], environment: 'node' } },
      {
        test: {
          name: 'browser',
          include: ['e2e/**/*.test.ts'],
          environment: 'node',
          testTimeout: 60_000,
          hookTimeout: 120_000,
          fileParallelism: false,
          retry: 0,
        },
      },
    ],
  },
});
