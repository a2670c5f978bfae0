// npm run dev: web and worker with reloading, on the development data folder.
import { spawn, spawnSync } from 'node:child_process'
import { env } from '@/lib/infra/env'

const node = process.execPath
const settings = { ...process.env, NODE_ENV: 'development', NEXTAUTH_URL: env.url }
const { status } = spawnSync(node, ['--import', 'tsx', 'scripts/prepare-school.ts'], { stdio: 'inherit', env: settings as NodeJS.ProcessEnv })
if (status !== 0) process.exit(status ?? 1)
const children = [
  spawn(node, ['node_modules/next/dist/bin/next', 'dev', '-p', String(env.PORT), '-H', env.SHEAFMARK_HOST], { stdio: 'inherit', env: settings as NodeJS.ProcessEnv }),
  spawn('node_modules/.bin/tsx', ['watch', '--clear-screen=false', 'scripts/worker.ts'], { stdio: 'inherit', env: settings as NodeJS.ProcessEnv }),
]
const stop = () => children.forEach((child) => child.kill('SIGTERM'))
process.on('SIGINT', stop)
process.on('SIGTERM', stop)
children.forEach((child) => child.on('exit', stop))
