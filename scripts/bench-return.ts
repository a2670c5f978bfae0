import { execFileSync, spawnSync } from 'node:child_process'
import { closeSync, fstatSync, mkdirSync, mkdtempSync, openSync, readFileSync, readSync, rmSync, statSync, writeSync } from 'node:fs'
import { writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { deflateSync } from 'node:zlib'
import { PDFDict, PDFDocument, PDFName, PDFRawStream } from 'pdf-lib'
import { halves } from '@/lib/core/marks'
import { drawMarkedPage } from '@/lib/handing-back/marked-page'
import { ObjectCopier } from '@/lib/handing-back/object-copier'
import type { ScriptPage } from '@/lib/handing-back/returned-page'
import { buildReturnedScript } from '@/lib/handing-back/returned-script'
import { loadSheafFile, type PiecewiseFile } from '@/lib/handing-back/sheaf-file'
import { StreamedFile } from '@/lib/handing-back/streamed-file'
import { aScriptPage, aStampAt, aSummary, everyday, truthPages } from '@/tests/make/a-script-to-return'
import { percentile } from '@/tests/accuracy/score-result'

// npm run bench:return [-- --rounds 5]
// All returned scripts of 30 students of two pages each, with summaries, beside `qpdf --split-pages=2` on the same sheaf, round by
// round; what a student's file holds beside its pictures and fonts; and the most memory a process takes for 30 and for 300 students.

const { values } = parseArgs({ options: { rounds: { type: 'string', default: '5' }, students: { type: 'string' }, sheaf: { type: 'string' } } })
const folder = values.sheaf ? join(values.sheaf, '..') : mkdtempSync(join(tmpdir(), 'sheafmark-bench-'))
const median = (of: readonly number[]) => percentile(of, 50)

/** The leaves of the everyday set in pairs of a script's two pages, over and over. */
const pairs = (() => {
  const leaves = truthPages()
  return [...new Set(leaves.map(({ candidate_number }) => candidate_number))].map((number) => leaves.filter(({ candidate_number }) => candidate_number === number)).filter(({ length }) => length === 2)
})()
const pairOf = (student: number) => pairs[student % pairs.length]!

/** A sheaf of as many students, each page with a picture of its own. */
async function makeSheaf(students: number): Promise<string> {
  const source = await PDFDocument.load(readFileSync(join(everyday, 'scan.pdf')), { updateMetadata: false })
  const pdf = await PDFDocument.create({ updateMetadata: false })
  const file = new StreamedFile(pdf)
  const path = join(folder, `${students}.pdf`)
  const out = openSync(path, 'w')
  const put = (parts: readonly Uint8Array[]) => { for (const part of parts) writeSync(out, part) }
  put([file.begin()])
  for (let student = 0; student < students; student++) {
    for (const leaf of pairOf(student)) {
      const from = source.getPage(leaf.index)
      const to = pdf.addPage([from.getWidth(), from.getHeight()])
      const copier = new ObjectCopier(source.context, pdf.context)
      for (const key of ['Contents', 'Resources', 'Rotate'].map((name) => PDFName.of(name))) {
        const value = from.node.get(key)
        if (value && key !== PDFName.of('Resources')) to.node.set(key, copier.copy(value)!)
      }
      const resources = PDFDict.withContext(pdf.context)
      resources.set(PDFName.of('XObject'), copier.copy(from.node.Resources()!.get(PDFName.of('XObject'))!)!)
      to.node.set(PDFName.of('Resources'), resources)
    }
    put(file.finished())
  }
  put(file.end())
  closeSync(out)
  return path
}

function marked(leaf: ReturnType<typeof truthPages>[number], index: number): ScriptPage {
  const stamps = Array.from({ length: 9 }, (_, k) => ({ stamp: aStampAt(120 + 30 * k, 110 + 70 * k, k === 4 ? { kind: 'note', worth: 0, text: 'look again at the second line' } : { kind: k % 3 === 2 ? 'cross' : 'tick', worth: k % 3 === 2 ? 0 : 2 }), pen: 'first' as const, label: `${k + 1}` }))
  const marks = stamps.map(({ label }, k) => ({ label, space: { x: 48, y: 90 + 70 * k, w: 500, h: 60 }, mark: halves(k % 3 === 2 ? 0 : 2), pen: 'first' as const }))
  const image = { width: leaf.width_px, height: leaf.height_px }
  const drawings = drawMarkedPage({ paper: { width: 595.28, height: 841.89 }, image, homography: leaf.homography, stamps, marks, total: { mark: halves(12), pen: 'first' } })
  return aScriptPage(leaf, { sheaf: 'sheaf', index, drawings })
}

function opened(path: string): PiecewiseFile & { close: () => void } {
  const file = openSync(path, 'r')
  return { size: fstatSync(file).size, close: () => closeSync(file), read: (offset, length) => {
    const bytes = Buffer.allocUnsafe(length)
    return bytes.subarray(0, readSync(file, bytes, 0, length, offset))
  } }
}

/** Builds every student's file, from opening the sheaf to the last file written. */
async function buildAll(path: string, students: number, into: string): Promise<void> {
  const file = opened(path)
  const sheaves = new Map([['sheaf', await loadSheafFile(file)]])
  for (let student = 0; student < students; student++) {
    const summary = aSummary({ student: `${['Zoë', 'Ibrahim', 'Łucja', 'Maryam'][student % 4]} ${['Souza', 'Okafor', 'Şen', 'Papadopoulou'][student % 3]}`, candidateNumber: String(8000 + student) })
    const pages = pairOf(student).map((leaf, k) => marked(leaf, 2 * student + k))
    await writeFile(join(into, `${student}.pdf`), await buildReturnedScript(sheaves, { summary, pages, builtAt: new Date('2026-03-18T12:00:00Z') }))
  }
  file.close()
}

type Took = Readonly<{ wall: number; cpu: number }>

async function taken(work: () => Promise<void>): Promise<Took> {
  const [started, before] = [performance.now(), process.cpuUsage()]
  await work()
  const { user, system } = process.cpuUsage(before)
  return { wall: performance.now() - started, cpu: (user + system) / 1000 }
}

/** What qpdf takes to part the same sheaf, in milliseconds; the shell tells its processor time. */
function splitting(sheaf: string, into: string): Took {
  const started = performance.now()
  const said = execFileSync('bash', ['-c', 'qpdf --split-pages=2 "$0" "$1"; times', sheaf, join(into, '%d.pdf')], { encoding: 'utf8' })
  const children = [...(said.trim().split('\n')[1] ?? '').matchAll(/(\d+)m([\d.]+)s/g)]
  return { wall: performance.now() - started, cpu: 1000 * children.reduce((sum, [, m, s]) => sum + Number(m) * 60 + Number(s), 0) }
}

/** Bytes of a file that belong neither to pictures nor to fonts: their glyphs, what these mean, and their tables as packed, with the words round each. */
async function besides(path: string): Promise<number> {
  const { context } = await PDFDocument.load(readFileSync(path), { updateMetadata: false })
  const objects = context.enumerateIndirectObjects().map(([, object]) => object)
  const fonts = objects.filter((object) => object instanceof PDFDict && ['/Font', '/FontDescriptor'].includes(String(object.get(PDFName.of('Type')))))
  const streams = fonts.flatMap((dict) => ['FontFile2', 'FontFile3', 'ToUnicode'].flatMap((key) => (dict as PDFDict).lookup(PDFName.of(key)) ?? []))
  const pictures = objects.filter((object) => object instanceof PDFRawStream && object.dict.get(PDFName.of('Subtype')) === PDFName.of('Image'))
  const big = [...streams, ...pictures].reduce((sum, stream) => sum + (stream instanceof PDFRawStream ? stream.contents.length : 0), 0) + streams.reduce((sum, stream) => sum + (stream as PDFRawStream).dict.toString().length + 45, 0)
  return statSync(path).size - big - deflateSync(fonts.join('\n'), { level: 9 }).length
}

async function main(): Promise<void> {
  if (values.students) {
    const into = mkdtempSync(join(tmpdir(), 'sheafmark-built-'))
    await buildAll(values.sheaf!, Number(values.students), into)
    rmSync(into, { recursive: true })
    console.log(Math.round(process.resourceUsage().maxRSS / 1024))
    return
  }
  const sheaf = await makeSheaf(30)
  const [built, split] = ['built', 'split'].map((name) => join(folder, name)) as [string, string]
  for (const path of [built, split]) mkdirSync(path)
  const [ours, peer]: [Took[], Took[]] = [[], []]
  for (let round = 0; round < Number(values.rounds); round++) {
    ours.push(await taken(() => buildAll(sheaf, 30, built)))
    peer.push(splitting(sheaf, split))
  }
  console.log(`30 students x 2 pages with summaries, ${values.rounds} rounds, medians (first round in brackets)`)
  const compared = (key: keyof Took) => {
    const [a, b] = [ours, peer].map((list) => list.map((took) => took[key])) as [number[], number[]]
    return `${key} ${median(a).toFixed(0)} (${a[0]!.toFixed(0)}) / ${median(b).toFixed(0)} = ${(median(a) / median(b)).toFixed(2)}, least ${Math.min(...a).toFixed(0)} / ${Math.min(...b).toFixed(0)} = ${(Math.min(...a) / Math.min(...b)).toFixed(2)}`
  }
  console.log(`ms against qpdf --split-pages=2 (goal 2.0, must 2.7): ${compared('wall')}; ${compared('cpu')}`)
  const added = await Promise.all(Array.from({ length: 30 }, async (_, k) => (await besides(join(built, `${k}.pdf`))) - (await besides(join(split, `${String(2 * k + 1).padStart(2, '0')}-${String(2 * k + 2).padStart(2, '0')}.pdf`)))))
  const whole = Array.from({ length: 30 }, (_, k) => statSync(join(built, `${k}.pdf`)).size).reduce((sum, size) => sum + size, 0)
  console.log(`added to a student's two pages, fonts apart: ${(median(added) / 1024).toFixed(1)} KB, most ${(Math.max(...added) / 1024).toFixed(1)} KB (at most 8); all files ${(whole / statSync(sheaf).size).toFixed(3)} x the sheaf`)
  for (const students of [30, 300]) {
    const path = students === 30 ? sheaf : await makeSheaf(students)
    const child = spawnSync(process.execPath, ['--import', 'tsx', import.meta.filename, '--students', String(students), '--sheaf', path], { encoding: 'utf8' })
    console.log(`memory at ${students} students (${(statSync(path).size / 2 ** 20).toFixed(0)} MB sheaf): ${child.stdout.trim()} MB${child.stderr ? ` ${child.stderr}` : ''}`)
  }
  rmSync(folder, { recursive: true })
}

await main()
