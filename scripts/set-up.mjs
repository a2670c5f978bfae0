// What both commands need before anything of ours can run. Plain Node.js: on a fresh clone nothing is installed yet.
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { fileURLToPath } from 'node:url'

export const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
export const bin = (name) => path.join(root, 'node_modules', '.bin', name)

/** Says what is wrong and what to do, and ends the command. */
export function giveUp(message) {
  console.error(`\n${message}`)
  process.exit(1)
}

/** Runs a program with its output on the screen; ends the command when it fails. Returns nothing. */
export function must(command, args, what, env = process.env) {
  const { status, error } = spawnSync(command, args, { cwd: root, stdio: 'inherit', env })
  if (error || status !== 0) giveUp(`${what} did not work${error ? ` (${error.message})` : ''}. What is printed above says why.`)
}

export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 9)) giveUp(`Sheafmark needs Node.js 20.9 or newer; this is ${process.version}. Install it and run the command again.`)
}

const sha = (...parts) => parts.reduce((hash, part) => hash.update(part), createHash('sha256')).digest('hex')
const stampIs = (file, value) => existsSync(file) && readFileSync(file, 'utf8') === value

/** Installs what package-lock.json says, when it is not what is installed. */
export function installPackages() {
  const lock = readFileSync(path.join(root, 'package-lock.json'))
  const stamp = path.join(root, 'node_modules', '.sheafmark-lock')
  if (stampIs(stamp, sha(lock))) return
  // A folder that already agrees with the lock (somebody ran npm ci) is left as it is.
  const inside = path.join(root, 'node_modules', '.package-lock.json')
  const agrees = existsSync(inside) && spawnSync('npm', ['ls', '--all', '--silent'], { cwd: root, stdio: 'ignore' }).status === 0
  if (!agrees) {
    console.log('Installing what Sheafmark needs (a few minutes the first time) ...')
    must('npm', ['ci', '--no-audit', '--no-fund'], 'Installing')
  }
  writeFileSync(stamp, sha(lock))
}

function* filesBelow(folder) {
  for (const entry of readdirSync(folder, { withFileTypes: true }).sort((a, b) => a.name.localeCompare(b.name))) {
    const full = path.join(folder, entry.name)
    if (entry.isDirectory()) yield* filesBelow(full)
    else if (!/\.test\.tsx?$/.test(entry.name)) yield full
  }
}

/** One hash over everything that goes into the build. */
function sourceHash() {
  const files = ['app', 'components', 'lib', 'db', 'public'].flatMap((folder) => [...filesBelow(path.join(root, folder))])
  files.push(...['next.config.mjs', 'tailwind.config.ts', 'tsconfig.json', 'package.json', 'package-lock.json', '.env'].map((name) => path.join(root, name)))
  return sha(...files.flatMap((file) => [path.relative(root, file), readFileSync(file)]))
}

/** Builds when the sources are not those of the build that is there. Returns whether it built. */
export function buildIfChanged() {
  const stamp = path.join(root, '.next', 'sheafmark-sources')
  const now = sourceHash()
  if (existsSync(path.join(root, '.next', 'BUILD_ID')) && stampIs(stamp, now)) return false
  console.log('Building (about a minute the first time) ...')
  must(bin('next'), ['build'], 'Building')
  mkdirSync(path.dirname(stamp), { recursive: true })
  writeFileSync(stamp, now)
  return true
}
