import tailwindcss from '@tailwindcss/vite'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'
import { readEngineRelease } from './server/engine-release.ts'

const root = import.meta.dirname
/** What the tests with a database share: one cluster for the run, one database a file. */
const database = { globalSetup: ['tests/support/database.ts'], setupFiles: ['tests/support/test-database.ts'], hookTimeout: 60_000 }

export default defineConfig({
  root: 'client',
  plugins: [react(), tailwindcss()],
  // The engine in the page is the one in the sources that the page is built from.
  define: { __ENGINE_RELEASE__: JSON.stringify(readEngineRelease()) },
  build: { outDir: '../dist/client', emptyOutDir: true, target: 'es2022', rolldownOptions: { checks: { bundlerTimings: false } } },
  worker: { format: 'es' },
  test: {
    root,
    // As many files at a time as the smallest machine that runs the tests has cores; the tool's own default leaves one of two idle.
    maxWorkers: 2,
    reporters: ['default', './tests/support/summary-reporter.ts'],
    projects: [
      { extends: true, test: { name: 'engine', root, include: ['tests/{engine,published,reference}/**/*.test.ts'], environment: 'node', testTimeout: 60_000 } },
      { extends: true, test: { name: 'server', root, include: ['tests/{api,jobs,server}/**/*.test.ts'], environment: 'node', ...database, testTimeout: 30_000 } },
      { extends: true, test: { name: 'client', root, include: ['tests/client/**/*.test.{ts,tsx}'], environment: 'jsdom', setupFiles: ['tests/support/client-setup.ts'] } },
      { extends: true, test: { name: 'e2e', root, include: ['tests/e2e/**/*.test.ts'], environment: 'node', ...database, testTimeout: 180_000, hookTimeout: 180_000, fileParallelism: false } },
    ],
  },
})
