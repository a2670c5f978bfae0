import { spawn } from 'node:child_process'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { classSetFolder, classSets, scoreFolder } from '@/tests/accuracy/class-set'
import { percentile } from '@/tests/accuracy/score-result'

// npm run bench:ingest [-- --rounds 5 --threads 1 FOLDER ...]
// Placement on class sets against their truth.json, and time a leaf beside that of pdftoppm drawing the same file, round by round.

const { values, positionals } = parseArgs({ allowPositionals: true, options: { rounds: { type: 'string', default: '3' }, threads: { type: 'string', default: '1' } } })
const rounds = Number(values.rounds)
const threads = Number(values.threads)

/** Seconds that pdftoppm takes to draw every page in grey, its output thrown away. */
async function drawSeconds(file: string, dpi: number): Promise<number> {
  const started = performance.now()
  const drawing = spawn('pdftoppm', ['-gray', '-r', String(dpi), file], { stdio: ['ignore', 'ignore', 'inherit'] })
  await new Promise<void>((done, failed) => drawing.on('error', failed).on('exit', () => done()))
  return (performance.now() - started) / 1000
}
const median = (of: readonly number[]) => percentile(of, 50)

async function bench(name: string, folder: string): Promise<void> {
  const truth = JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as { dpi?: number }
  const dpi = truth.dpi === 300 ? 300 : 200
  const leaves: number[] = []
  const startup: number[] = []
  const peer: number[] = []
  let last
  for (let round = 0; round < rounds; round++) {
    last = await scoreFolder(folder, threads)
    leaves.push(last.result.leavesSeconds)
    startup.push(last.result.startupSeconds)
    peer.push(await drawSeconds(join(folder, 'scan.pdf'), dpi))
  }
  const { score, result } = last!
  const count = result.readings.length
  const off = (p: number) => (score.errors.length ? percentile(score.errors, p).toFixed(3) : '-')
  const ms = (1000 * median(leaves)) / count
  const peerMs = (1000 * median(peer)) / count
  console.log(
    `${name.padEnd(10)} placed ${score.scripts - score.loose}/${score.scripts}  wrong ${score.wrong}  right kind ${score.rightKind}/${score.pages}  turn ${score.rightTurn}  split ${score.split}  mm p95 ${off(95)} max ${off(100)}  mark ${score.mark.toFixed(1)}` +
      `  |  ${ms.toFixed(0)} ms a leaf, pdftoppm -r ${dpi} ${peerMs.toFixed(0)} ms, ratio ${(ms / peerMs).toFixed(2)}, start ${(1000 * median(startup)).toFixed(0)} ms`,
  )
  const steps = [0, 0.2, 0.4, 0.6, 0.8, 0.95, 1.01]
  const placed = result.findings.filter((finding) => finding.kind === 'script')
  const bins = steps.slice(1).map((to, k) => `${steps[k]}-${Math.min(1, to)}: ${placed.filter((f) => f.confidence >= steps[k]! && f.confidence < to).length}`)
  console.log(`${''.padEnd(10)} placed by confidence  ${bins.join('  ')}`)
}

async function main(): Promise<void> {
  console.log(`${rounds} rounds, medians; ${threads} thread(s); the peer runs in the same command`)
  const folders = positionals.length ? positionals.map((folder) => [folder.split('/').at(-1)!, folder] as const) : classSets.map((name) => [name, classSetFolder(name)] as const)
  for (const [name, folder] of folders) await bench(name, folder)
}
main()
