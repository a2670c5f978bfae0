import path from 'node:path'
import { defineConfig } from '@playwright/test'

const root = path.join(import.meta.dirname, '..')

function school(name: string, port: number, settings: Record<string, string>) {
  const data = path.join(import.meta.dirname, 'results', name)
  return {
    command: `node -e "fs.rmSync('${data}', { recursive: true, force: true })" && exec node scripts/start.mjs`,
    cwd: root,
    url: `http://localhost:${port}/api/health`,
    timeout: 600_000,
    gracefulShutdown: { signal: 'SIGTERM' as const, timeout: 10_000 },
    stdout: 'pipe' as const,
    env: { PORT: String(port), SHEAFMARK_DATA: data, SHEAFMARK_LOG: 'warn', ...settings },
  }
}

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
    baseURL: 'http://localhost:3187',
    viewport: { width: 1440, height: 900 },
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
    },
  },
  // The school's own start command on the built tree, each time from nothing: the seeded demo, and an empty real school.
  webServer: [school('demo', 3187, { SHEAFMARK_FAKE_SMTP_PORT: '3189' }), school('real', 3188, { SHEAFMARK_DEMO: '0', SHEAFMARK_SCHOOL: 'Kestrel Bay School', SHEAFMARK_FAKE_SMTP_PORT: '3190' })],
})
