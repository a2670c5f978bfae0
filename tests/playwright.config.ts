import path from 'node:path'
import { defineConfig } from '@playwright/test'

const root = path.join(import.meta.dirname, '..')
const port = 3187
const address = `http://localhost:${port}`

export default defineConfig({
  testDir: 'journeys',
  outputDir: 'results/journeys',
  timeout: 180_000,
  expect: { timeout: 15_000 },
  // One school, one story after the other.
  workers: 1,
  fullyParallel: false,
  retries: 0,
  reporter: [['list'], ['json', { outputFile: path.join(import.meta.dirname, 'results', 'journeys.json') }]],
  use: {
    baseURL: address,
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
    },
  },
  // The school's own start command on the built tree: seeded demo, web and worker.
  webServer: {
    command: 'node scripts/start.mjs',
    cwd: root,
    url: `${address}/api/health`,
    timeout: 600_000,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 10_000 },
    stdout: 'pipe',
    env: { PORT: String(port), SHEAFMARK_DATA: path.join(import.meta.dirname, 'results', 'data'), SHEAFMARK_FAKE_SMTP_PORT: '3189', SHEAFMARK_LOG: 'warn' },
  },
})
