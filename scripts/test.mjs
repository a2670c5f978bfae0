// npm test: everything CI runs, from a fresh clone. Ends with one line over all of it.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { bin, checkNode, giveUp, installPackages, root } from './set-up.mjs'

const tools = { chromium: 'chromium', pdftoppm: 'poppler-utils', qpdf: 'qpdf', mutool: 'mupdf-tools', zbarimg: 'zbar-tools' }

function installTools() {
  const missing = Object.entries(tools).filter(([program]) => spawnSync('sh', ['-c', `command -v ${program}`]).status !== 0).map(([, name]) => name)
  if (missing.length === 0) return
  const command = `apt-get install -y --no-install-recommends ${missing.join(' ')}`
  if (process.getuid?.() !== 0) giveUp(`The tests look at pages and PDFs with other programs. Install them first:\n  sudo ${command}`)
  console.log(`Installing ${missing.join(', ')} ...`)
  const quiet = { stdio: ['ignore', 'ignore', 'inherit'], env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } }
  spawnSync('apt-get', ['update', '-qq'], quiet)
  if (spawnSync('sh', ['-c', command], quiet).status !== 0) giveUp(`Could not run: ${command}`)
}

const results = path.join(root, 'tests', 'results')
let passed = 0
let failed = 0

function step(name, command, args, count) {
  console.log(`\n== ${name}`)
  const started = Date.now()
  const { status } = spawnSync(command, args, { cwd: root, stdio: 'inherit', env: { ...process.env, NEXT_TELEMETRY_DISABLED: '1' } })
  const counted = count?.() ?? { passed: 0, failed: 0 }
  // A step that broke without naming a failed test is itself the failure; one that counts nothing is itself the test.
  const own = count ? 0 : 1
  if (status === 0) passed += own
  else failed += counted.failed > 0 ? 0 : 1
  passed += counted.passed
  failed += counted.failed
  console.log(`== ${name}: ${status === 0 ? 'good' : 'FAILED'} (${Math.round((Date.now() - started) / 1000)} s)`)
  return status === 0
}

const report = (file, read) => () => (existsSync(file) ? read(JSON.parse(readFileSync(file, 'utf8'))) : { passed: 0, failed: 0 })

checkNode()
installPackages()
installTools()
rmSync(results, { recursive: true, force: true })
mkdirSync(results, { recursive: true })
step('lint', bin('eslint'), ['-c', 'scripts/eslint.config.mjs', '--max-warnings', '20', '.'])
step('types', 'sh', ['-c', `${bin('next')} typegen && ${bin('tsc')} --noEmit`])
const unit = path.join(results, 'unit.json')
step('unit and task tests', bin('vitest'), ['run', '-c', 'tests/vitest.config.ts', '--reporter=default', '--reporter=json', `--outputFile.json=${unit}`],
  report(unit, (json) => ({ passed: json.numPassedTests, failed: json.numFailedTests })))
const built = step('build', process.execPath, ['scripts/build.mjs'])
const journeys = path.join(results, 'journeys.json')
if (built) {
  step('journeys', bin('playwright'), ['test', '-c', 'tests/playwright.config.ts'],
    report(journeys, (json) => ({ passed: json.stats.expected, failed: json.stats.unexpected + json.stats.flaky })))
}
console.log(`\n${passed} passed, ${failed} failed`)
process.exit(failed === 0 && passed > 0 ? 0 : 1)
