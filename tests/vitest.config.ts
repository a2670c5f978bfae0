import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('..', import.meta.url))

export default defineConfig({
  root,
  resolve: { alias: { '@': root.replace(/\/$/, '') } },
  test: {
    include: ['{app,components,lib,db,scripts,seeds}/**/*.test.{ts,tsx}', 'tests/{tasks,accuracy,doors}/**/*.test.ts'],
    setupFiles: ['tests/set-up.ts'],
    testTimeout: 60_000,
    hookTimeout: 120_000,
    maxWorkers: 2,
  },
})
