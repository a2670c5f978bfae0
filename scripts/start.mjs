// npm start: everything from a fresh clone to a running school. Run again it takes seconds and keeps the data.
import { spawn } from 'node:child_process'
import { bin, buildIfChanged, checkNode, giveUp, installPackages, must, root } from './set-up.mjs'

checkNode()
installPackages()
process.chdir(root)
// Threads that decode pictures each keep memory of their own otherwise: some 100 MB that nothing needs.
const env = { MALLOC_ARENA_MAX: '2', ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' }
must(bin('tsx'), ['scripts/prepare-school.ts'], 'Preparing the school', env)
buildIfChanged()

const port = env.PORT || '3000'
const host = env.SHEAFMARK_HOST || '127.0.0.1'
const address = env.SHEAFMARK_URL || `http://localhost:${port}`
const children = new Map()
let stopping = false

function run(name, command, args) {
  const child = spawn(command, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'], env: { ...env, NEXTAUTH_URL: address } })
  children.set(name, child)
  child.on('exit', (code) => {
    children.delete(name)
    if (stopping) return
    // The worker's jobs are durable: it is started again and goes on. Without the web server there is nothing to serve.
    if (name === 'worker') setTimeout(() => !stopping && run(name, command, args), 1000)
    else stop(`The ${name} server stopped (${code}). ${code === 1 ? `Is port ${port} in use? Choose another with PORT=3001 npm start.` : ''}`)
  })
}

function stop(why) {
  if (stopping) return
  stopping = true
  for (const child of children.values()) child.kill('SIGTERM')
  const done = () => (why ? giveUp(why) : process.exit(0))
  const tick = setInterval(() => children.size === 0 && (clearInterval(tick), done()), 50)
  setTimeout(() => { for (const child of children.values()) child.kill('SIGKILL'); done() }, 8000).unref()
}
process.on('SIGINT', () => stop())
process.on('SIGTERM', () => stop())

run('web', process.execPath, [`${root}/node_modules/next/dist/bin/next`, 'start', '-p', port, '-H', host])
run('worker', process.execPath, ['--import', 'tsx', 'scripts/worker.ts'])

for (let tries = 0; tries < 240 && !stopping; tries++) {
  const up = await fetch(`http://${host === '0.0.0.0' ? '127.0.0.1' : host}:${port}/api/health`).then((r) => r.ok, () => false)
  if (up) break
  await new Promise((resolve) => setTimeout(resolve, 250))
}
if (!stopping) must(bin('tsx'), ['scripts/say-address.ts', address], 'Saying the address', env)
