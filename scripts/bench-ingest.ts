import { spawn } from 'node:child_process'
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { clearFrom } from '@/lib/registering/register-leaf'
import { calibrated, derivedThreshold, placedConfidences, printConfidences, sayCalibration } from '@/tests/accuracy/calibration'
import { collectAtOnce } from '@/lib/infra/collect-at-once'
import { classSetFolder, classSets, codedSetFolder, scoreFolder } from '@/tests/accuracy/class-set'
import { percentile } from '@/tests/accuracy/score-result'
import { benchLong } from './bench-long'

// npm run bench:ingest [-- --rounds 5 --threads 1 FOLDER ...]
// npm run bench:ingest -- --long [--threads 2] [FOLDER]: cost a leaf and peak memory of sheaves of 100, 400 and 1,600 pages
// Placement on class sets against their truth.json, and time a leaf beside that of pdftoppm drawing the same file, round by round.

const { values, positionals } = parseArgs({ allowPositionals: true, options: { rounds: { type: 'string', default: '5' }, threads: { type: 'string', default: '1' }, long: { type: 'boolean', default: false } } })
const rounds = Number(values.rounds)
const threads = Number(values.threads)

type Took = Readonly<{ wall: number; cpu: number }>

/** Seconds that pdftoppm takes to draw every page in grey, its output thrown away. The shell's `times` tells its processor time. */
async function drawing(file: string, dpi: number): Promise<Took> {
  const started = performance.now()
  const shell = spawn('bash', ['-c', 'pdftoppm -gray -r "$0" "$1" > /dev/null; times', String(dpi), file], { stdio: ['ignore', 'pipe', 'inherit'] })
  let said = ''
  shell.stdout.on('data', (part: Buffer) => { said += part.toString() })
  await new Promise<void>((done, failed) => shell.on('error', failed).on('close', () => done()))
  const children = [...(said.trim().split('\n')[1] ?? '').matchAll(/(\d+)m([\d.]+)s/g)]
  return { wall: (performance.now() - started) / 1000, cpu: children.reduce((sum, [, m, s]) => sum + Number(m) * 60 + Number(s), 0) }
}
const median = (of: readonly number[]) => percentile(of, 50)

async function bench(name: string, folder: string): Promise<void> {
  const truth = JSON.parse(await readFile(join(folder, 'truth.json'), 'utf8')) as { dpi?: number }
  const dpi = truth.dpi === 300 ? 300 : 200
  const leaves: Took[] = []
  const startup: number[] = []
  const alone: number[] = []
  const peer: Took[] = []
  let last
  for (let round = 0; round < rounds; round++) {
    last = await scoreFolder(folder, threads)
    leaves.push({ wall: last.result.leavesSeconds, cpu: last.result.leavesCpuSeconds })
    startup.push(last.result.startupSeconds)
    if (threads > 1) alone.push((await scoreFolder(folder, 1)).result.leavesSeconds)
    peer.push(await drawing(join(folder, 'scan.pdf'), dpi))
  }
  const { score, result, codes, numbers, ink } = last!
  const count = result.readings.length
  const off = (p: number) => (score.errors.length ? percentile(score.errors, p).toFixed(3) : '-')
  const each = (of: readonly Took[], key: keyof Took) => (1000 * median(of.map((took) => took[key]))) / count
  const compared = (key: keyof Took) => `${each(leaves, key).toFixed(0)} / ${each(peer, key).toFixed(0)} = ${(each(leaves, key) / each(peer, key)).toFixed(2)}`
  console.log(
    `${name.padEnd(10)} ${codes ? `codes read ${codes.read}/${codes.printed}  ` : ''}placed ${score.scripts - score.loose}/${score.scripts}  wrong ${score.wrong}  right kind ${score.rightKind}/${score.pages}  turn ${score.rightTurn}  split ${score.split}  mm p95 ${off(95)} max ${off(100)}  mark ${score.mark.toFixed(1)}` +
      `  |  ms a leaf against pdftoppm -r ${dpi}: cpu ${compared('cpu')}, wall ${compared('wall')}, start ${(1000 * median(startup)).toFixed(0)} ms` +
      (threads > 1 ? `, throughput of ${threads} threads ${(median(alone) / median(leaves.map((took) => took.wall))).toFixed(2)} times that of one` : ''),
  )
  const strangers = numbers.strangersNamed ? `, STRANGERS NAMED ${numbers.strangersNamed}` : ''
  const gap = Number.isFinite(ink.leastWritten) ? `, empty at most ${ink.mostBlank.toFixed(2)} mm², written at least ${ink.leastWritten.toFixed(2)}` : ''
  console.log(`${''.padEnd(10)} digits right ${numbers.digitsRight}/${numbers.digits}  numbers right ${numbers.right} wrong ${numbers.wrong} left open ${numbers.open}${strangers}  |  nothing written found ${ink.hits}/${ink.blank}, written taken for empty ${ink.misses}/${ink.written}${gap}`)
  const [print, placed] = [printConfidences(last!), placedConfidences(last!)]
  console.log(`${''.padEnd(10)} right of placed at each confidence  ${sayCalibration(calibrated(placed))}`)
  byPrint.push(...print)
  byPlace.push(...placed)
}

/** Confidences of all sets together: of each leaf's likeliest page, and of what was placed. */
const byPrint: ReturnType<typeof printConfidences> = []
const byPlace: ReturnType<typeof placedConfidences> = []

async function main(): Promise<void> {
  if (values.long) return benchLong(positionals[0] ?? classSetFolder('everyday'), threads)
  console.log(`${rounds} rounds, medians; ${threads} thread(s); the peer runs in the same command`)
  const folders = positionals.length ? positionals.map((folder) => [folder.split('/').at(-1)!, folder] as const) : [...classSets.map((name) => [name, classSetFolder(name)] as const), ['coded', codedSetFolder] as const]
  for (const [name, folder] of folders) await bench(name, folder)
  const steps = calibrated(byPrint)
  console.log(`all sets   right page by print alone at each confidence  ${sayCalibration(steps)}`)
  console.log(`${''.padEnd(10)} right of placed at each confidence  ${sayCalibration(calibrated(byPlace))}`)
  console.log(`${''.padEnd(10)} a print is believed from ${clearFrom}; these sets ask for ${derivedThreshold(steps).toFixed(1)}`)
}
collectAtOnce()
main()
