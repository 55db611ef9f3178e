import { defineConfig } from 'vitest/config'

// base './' so that the built app also works from a sub-folder or a file share.
export default defineConfig({
  base: './',
  worker: { format: 'es' },
  build: { target: 'es2022', chunkSizeWarningLimit: 900 },
  // A dependency that the dev server meets late (inside the worker) would reload the page and lose state.
  optimizeDeps: { include: ['clipper-lib', 'robust-predicates', 'comlink', 'earcut'] },
  server: { host: '127.0.0.1' },
  preview: { host: '127.0.0.1' },
  test: {
    include: ['test/**/*.test.ts'],
    testTimeout: 120_000,
    hookTimeout: 240_000,
    maxWorkers: 2,
  },
})
